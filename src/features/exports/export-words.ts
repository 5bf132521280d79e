import type { BundleExport } from '../../../server/contract/exports.ts'

/** What a bundle is called: the notebook's or entry's numbers. */
export function bundleTitle(bundle: Pick<BundleExport, 'entries' | 'notebookId' | 'name'>): string {
  const numbers = bundle.entries.map((entry) => entry.number)
  const [first, ...more] = numbers
  if (first === undefined) return bundle.name ?? 'Notebook'
  const notebook = first.split('/')[0] ?? first
  if (bundle.notebookId !== null) return `${notebook}, whole`
  if (more.length === 0) return first
  return more.every((number) => number.startsWith(notebook))
    ? `${notebook}, ${numbers.length} entries`
    : `${numbers.length} entries`
}

/** How far an export is, and whether one may leave. */
export function statusWords(status: BundleExport['status']): string {
  switch (status) {
    case 'queued':
      return 'Waits for a worker. You may leave this page.'
    case 'running':
      return 'The bundle is put together and signed. You may leave this page.'
    case 'waiting-for-time-stamp':
      return 'Waits for a time stamp, up to ten minutes; then the bundle is offered without it. You may leave this page.'
    case 'done':
      return 'Exported'
    case 'failed':
      return 'Not exported'
  }
}

/** How far along the bar stands: there are three steps, none of which can be timed. */
export function statusShare(status: BundleExport['status']): number | null {
  const shares = { queued: 0.1, running: 0.5, 'waiting-for-time-stamp': 0.8, done: 1, failed: null }
  return shares[status]
}

/** The command that checks a bundle in a checkout of the program got elsewhere. */
export function verifyCommand(name: string): string {
  return `npm run verify -- ${name} --anchors anchors.json`
}
