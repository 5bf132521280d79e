import type { ReactNode } from 'react'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { stampTime } from '../../lib/times.ts'
import { urlOf } from '../../lib/url-of.ts'
import { Provenance } from '../../ui/block.tsx'
import { TextButton } from '../../ui/button.tsx'
import { Digest } from '../../ui/digest.tsx'

interface BlockFootProps {
  calculation: Calculation
  placeActs?: ReactNode
  /** Null where it cannot be computed again now. */
  onRecompute: (() => void) | null
}

/** Where the figures come from: engine, bytes, time; and what can be done with them. */
export function BlockFoot({ calculation, placeActs, onRecompute }: BlockFootProps) {
  const { id, label, engine, version, provenance, inputs, status } = calculation
  const files = provenance?.inputs ?? inputs.filter((input) => 'fileId' in input)
  const done = status === 'done'
  return (
    <Provenance
      actions={
        <>
          {onRecompute && <TextButton onClick={onRecompute}>Recompute</TextButton>}
          {done && (
            <>
              <a className="hs-link" href={urlOf('getCalculationCsv', { id })} download={`${label}.csv`}>
                CSV
              </a>
              <a className="hs-link" href={urlOf('getCalculationSvg', { id })} download={`${label}.svg`}>
                SVG
              </a>
            </>
          )}
          {placeActs}
        </>
      }
    >
      <span>
        engine {provenance?.engine ?? engine}, version {version}
      </span>
      {files.map((file) => (
        <span key={file.fileId}>
          input <Digest sha256={file.sha256} size={18} />
        </span>
      ))}
      {provenance && <span>computed {stampTime(provenance.finishedAt)}</span>}
    </Provenance>
  )
}
