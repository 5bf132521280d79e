import type { Check, VerifyReport } from '../../../../server/ledger-format/verify/index.ts'

type Child = Node | string

/** An element with text or children; texts never become markup. */
function element<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  attributes: Record<string, string> = {},
  ...children: Child[]
): HTMLElementTagNameMap[Tag] {
  const node = document.createElement(tag)
  for (const [name, value] of Object.entries(attributes)) node.setAttribute(name, value)
  node.append(...children)
  return node
}

const anchorsSentence = {
  matched: 'The anchors match: these are the keys of the laboratory whose anchors you gave.',
  different:
    'The anchors are different: this bundle was not made with the keys of the laboratory whose anchors you gave.',
  'not-given':
    'No anchors were given. A bundle can only be consistent with itself; whose keys these are was not checked. Compare these digests with the anchors that the laboratory gave you apart from the bundle.',
} as const

const verdictSentence = {
  holds: 'Everything holds',
  broken: 'Something is false',
  incomplete: 'Nothing is false, but something is missing',
} as const

const digestNames: Record<string, string> = {
  laboratory: 'Laboratory',
  caSha256: 'Certificate authority (SHA-256)',
  ledgerKeysSha256: 'Ledger keys, first to current (SHA-256)',
  rootEnrolmentSha256: 'First manager’s enrolment (SHA-256)',
  tsaRootsSha256: 'Time-stamp authorities’ roots (SHA-256)',
}

/** The report: whose keys these are first, then the verdict, what fails, what is missing, remarks, and every check. */
export function reportNodes(report: VerifyReport): Node[] {
  const { checks, verdict, about } = report
  const failed = checks.filter((check) => check.ok === false)
  const missing = checks.filter((check) => check.ok === null)
  const remarks = checks.filter((check) => check.ok === true && check.detail !== '')
  const counts = `${checks.length} checks: ${failed.length} false, ${missing.length} missing.`
  return [
    anchorsNode(report),
    element('h2', { id: 'verdict', class: verdict, tabindex: '-1' }, verdictSentence[verdict]),
    element('p', {}, `${about.topFolder}. ${counts}`),
    ...checkTable('What is false', failed),
    ...checkTable('What is missing', missing),
    ...checkTable('Remarks', remarks),
    element('details', {}, element('summary', {}, 'Every check'), ...checkTable('Every check', checks)),
  ]
}

function anchorsNode({ anchors, about }: VerifyReport): Node {
  const node = element(
    'div',
    { class: 'anchors' },
    element('p', { class: anchors }, anchorsSentence[anchors]),
  )
  if (about.digests) node.append(digestList(about.digests))
  if (about.timeStampAuthority !== null) node.append(element('p', {}, about.timeStampAuthority))
  return node
}

function digestList(digests: object): HTMLElement {
  const items = Object.entries(digests).flatMap(([name, value]) => [
    element('dt', {}, digestNames[name] ?? name),
    ...[value as string | string[]].flat().map((text) => element('dd', {}, text)),
  ])
  return element('dl', { class: 'digests' }, ...items)
}

const words = new Map<boolean | null, string>([
  [true, 'holds'],
  [false, 'false'],
  [null, 'missing'],
])

function checkTable(title: string, checks: readonly Check[]): HTMLElement[] {
  if (checks.length === 0) return []
  const heads = ['Answer', 'Check', 'Path', 'Detail'].map((name) => element('th', { scope: 'col' }, name))
  const rows = checks.map((check) =>
    element(
      'tr',
      {},
      element('td', { class: verdictClass(check.ok) }, words.get(check.ok) ?? ''),
      element('td', {}, check.name),
      element('td', { class: 'path' }, check.path),
      element('td', {}, check.detail),
    ),
  )
  return [
    element(
      'table',
      {},
      element('caption', {}, title),
      element('thead', {}, element('tr', {}, ...heads)),
      element('tbody', {}, ...rows),
    ),
  ]
}

function verdictClass(ok: boolean | null): string {
  return ok === null ? 'incomplete' : ok ? 'holds' : 'broken'
}
