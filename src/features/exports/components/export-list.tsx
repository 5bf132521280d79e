import { useQuery } from '@tanstack/react-query'
import type { BundleExport } from '../../../../server/contract/exports.ts'
import { sizeText } from '../../../lib/format-quantity.ts'
import { nearTime } from '../../../lib/times.ts'
import { urlOf } from '../../../lib/url-of.ts'
import { shortDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Section } from '../../../ui/sheet.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { bundleTitle, statusWords } from '../export-words.ts'
import { exportsQuery } from '../queries.ts'
import { bundleFileName } from './bundle-state.tsx'

const shownAtMost = 6

/** My latest exports. A bundle that is there can be fetched again until it expires. */
export function ExportList() {
  const { data } = useQuery(exportsQuery)
  if (!data || data.items.length === 0) return null
  const items = data.items.slice(0, shownAtMost)
  return (
    <Section title="Exports" count={`last ${items.length}`}>
      <ul className="hs-stack">
        {items.map((bundle) => (
          <ExportItem key={bundle.id} bundle={bundle} />
        ))}
      </ul>
    </Section>
  )
}

function ExportItem({ bundle }: { bundle: BundleExport }) {
  const title = bundleTitle(bundle)
  return (
    <li>
      {bundle.sha256 ? (
        <FringeMark sha256={bundle.sha256} size={26} />
      ) : (
        <StateGlyph state={glyphOf(bundle)} wordless />
      )}
      <span>
        {bundle.status === 'done' ? (
          <a
            className="hs-link"
            href={urlOf('getBundle', { id: bundle.id })}
            download={bundleFileName(bundle)}
          >
            {title}
          </a>
        ) : (
          title
        )}
        <span className="hs-quiet block text-1">
          {nearTime(bundle.createdAt)}
          {bundle.sha256 ? (
            <>
              , <span className="hs-fig">{shortDigest(bundle.sha256)}</span>
              {bundle.size !== null && `, ${sizeText(bundle.size)}`}
            </>
          ) : (
            `. ${bundle.error?.detail ?? statusWords(bundle.status)}`
          )}
        </span>
      </span>
    </li>
  )
}

function glyphOf(bundle: BundleExport) {
  return bundle.status === 'failed' ? 'failed' : bundle.status === 'queued' ? 'queued' : 'running'
}
