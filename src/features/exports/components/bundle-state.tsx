import type { BundleExport } from '../../../../server/contract/exports.ts'
import { sizeText } from '../../../lib/format-quantity.ts'
import { urlOf } from '../../../lib/url-of.ts'
import { groupedDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Icon } from '../../../ui/icon.tsx'
import { Message } from '../../../ui/message.tsx'
import { Progress } from '../../../ui/progress.tsx'
import { bundleTitle, statusShare, statusWords, verifyCommand } from '../export-words.ts'

/** One export: how far it is, and when it is there, the bundle, its digest and how to check it elsewhere. */
export function BundleState({ bundle }: { bundle: BundleExport }) {
  if (bundle.status === 'failed')
    return (
      <Message kind="fault" title={`${bundleTitle(bundle)} was not exported.`} code={bundle.error?.code}>
        {bundle.error?.detail ?? 'The worker gave no reason.'} Nothing in the notebook was changed; start the
        export again.
      </Message>
    )
  if (bundle.status !== 'done')
    return (
      <Progress
        label={`Export of ${bundleTitle(bundle)}`}
        share={statusShare(bundle.status)}
        words={statusWords(bundle.status)}
      />
    )
  return <FinishedBundle bundle={bundle} />
}

function FinishedBundle({ bundle }: { bundle: BundleExport }) {
  const name = bundleFileName(bundle)
  return (
    <div className="grid gap-3">
      <Message kind="good" title="Exported.">
        {bundleTitle(bundle)}
        {bundle.size !== null && `, ${sizeText(bundle.size)}`}
      </Message>
      <a className="hs-button hs-button-primary" href={urlOf('getBundle', { id: bundle.id })} download={name}>
        <Icon name="download" size={17} />
        Download bundle
      </a>
      {bundle.sha256 && (
        <div className="flex items-start gap-2.5">
          <FringeMark sha256={bundle.sha256} size={34} />
          <p className="hs-fig hs-digest-full text-1">{groupedDigest(bundle.sha256, 8)}</p>
        </div>
      )}
      <div>
        <p className="mb-1">
          Check it on another machine, with anchors that came to you apart from the bundle:
        </p>
        <pre className="hs-fig bg-well p-2 text-1 whitespace-pre-wrap break-all">{verifyCommand(name)}</pre>
        <p className="hs-hint">
          Or open check.html inside the bundle: it runs from disk, without a network. VERIFY.md says how to do
          the same with general tools.
        </p>
      </div>
    </div>
  )
}

/** Name of the zip as the server gives it, or one made from the numbers. */
export function bundleFileName(bundle: Pick<BundleExport, 'name' | 'entries' | 'notebookId'>): string {
  const name =
    bundle.name ?? bundleTitle(bundle).replaceAll('/', '-').replaceAll(', ', '-').replaceAll(' ', '-')
  return name.endsWith('.zip') ? name : `${name}.zip`
}
