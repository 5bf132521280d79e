import { useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { figureInFull } from '../../lib/format-quantity.ts'
import { StateGlyph, type StateName } from '../../ui/state-glyph.tsx'
import { Tip } from '../../ui/tip.tsx'
import { calculationQuery } from './queries.ts'

/**
 * A figure in a sentence: the signed characters of value and uncertainty, then the unit. It follows its calculation,
 * tells where it comes from, and warns when that is not sound.
 */
export function QuotedFigure({ calculationId, pointer }: { calculationId: string; pointer: string }) {
  const { data: calculation, isError } = useQuery(calculationQuery(calculationId))
  if (isError)
    return (
      <Quote glyph="fault" origin="The calculation behind this figure cannot be read." text="no figure" />
    )
  if (!calculation) return <Quote glyph={null} origin="The figure is on its way." text="…" />
  const figure = calculation.figures.find((each) => each.pointer === pointer)
  const { glyph, words } = soundness(calculation, figure !== undefined)
  const origin = `${figure?.label ?? pointer}, calculation ${calculation.label}${words}`
  return <Quote glyph={glyph} origin={origin} text={figure ? figureInFull(figure) : 'no figure'} />
}

function soundness(
  { status, stale }: Calculation,
  found: boolean,
): { glyph: StateName | null; words: string } {
  if (status === 'failed' || status === 'cancelled')
    return { glyph: 'failed', words: ', which has no result now' }
  if (status !== 'done') return { glyph: 'running', words: ', which is being computed anew' }
  if (stale) return { glyph: 'stale', words: ', which is out of date' }
  if (!found) return { glyph: 'fault', words: ', which does not report this figure any more' }
  return { glyph: null, words: '' }
}

function Quote({ text, origin, glyph }: { text: ReactNode; origin: string; glyph: StateName | null }) {
  return (
    <Tip words={origin}>
      <span className="hs-quoted hs-fig" data-sound={glyph === null ? '' : undefined} tabIndex={0}>
        {glyph && <StateGlyph state={glyph} wordless />}
        {text}
      </span>
    </Tip>
  )
}
