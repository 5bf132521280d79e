import type { FigureText } from '../../../server/contract/calculations.ts'
import { BlockResult } from '../../ui/block.tsx'
import { KeyResult, OtherResult } from '../../ui/quantity.tsx'
import { Symbol } from '../../ui/symbol.tsx'
import { labelParts } from './figure-label.ts'

/** The figures a calculation reports, the first one large. */
export function KeyResults({ figures, stale }: { figures: FigureText[]; stale: boolean }) {
  const [key, ...others] = figures
  if (!key) return null
  return (
    <BlockResult>
      <KeyResult
        symbol={<FigureName label={key.label} />}
        value={key.value}
        u={key.u}
        unit={key.unit ?? ''}
        stale={stale}
      />
      {others.map(({ pointer, label, value, u, unit }) => (
        <OtherResult
          key={pointer}
          name={<FigureName label={label} equals />}
          value={value}
          u={u}
          unit={unit ?? ''}
        />
      ))}
    </BlockResult>
  )
}

/** A symbol in its own setting, then words; `equals` puts = after it where a symbol stands. */
export function FigureName({ label, equals = false }: { label: string; equals?: boolean }) {
  const { symbol, words } = labelParts(label)
  if (symbol === null) return <>{label}</>
  return (
    <>
      <Symbol>{symbol}</Symbol>
      {words && <span className="hs-figure-words">{words}</span>}
      {equals && ' ='}
    </>
  )
}
