import { useQuery } from '@tanstack/react-query'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { ApiProblem, sentenceOf } from '../../lib/api-problem.ts'
import { RoleKey } from '../../plots/channel-key.tsx'
import { FigurePlot } from '../../plots/figure-plot.tsx'
import { BlockPart } from '../../ui/block.tsx'
import { Message } from '../../ui/message.tsx'
import { figureQuery, isGoingOn } from './queries.ts'

/** The curve. While it is computed anew the curve before stays in place, and says that it is the one before. */
export function CalculationFigure({ calculation }: { calculation: Calculation }) {
  const { id, resultSha256, status } = calculation
  const { data: figure, error } = useQuery(figureQuery(id, resultSha256))
  // A kind may have nothing to draw; then the figures below say it all.
  const nothingToDraw = error instanceof ApiProblem && (error.status === 404 || error.status === 409)
  if (error && !nothingToDraw) return <Message kind="fault">{sentenceOf(error)}</Message>
  if (!figure || status === 'failed' || status === 'cancelled') return null
  const before = isGoingOn(status) || resultSha256 === null
  return (
    <BlockPart>
      <div className="hs-figure-stage" data-before={before ? '' : undefined}>
        {before && <p className="hs-quiet">The curve before this change</p>}
        <FigurePlot figure={figure} />
      </div>
    </BlockPart>
  )
}

/** The marked line samples of a figure with several channels, to stand in the line of inputs. */
export function FigureLegend({ calculation }: { calculation: Calculation }) {
  const { data: figure } = useQuery(figureQuery(calculation.id, calculation.resultSha256))
  const series = figure?.panels.flatMap((panel) => panel.series) ?? []
  const channels = series.filter(
    ({ role }, at) => isChannel(role) && series.findIndex((each) => each.role === role) === at,
  )
  if (channels.length < 2) return null
  return channels.map(({ role, label }) => (
    <RoleKey key={role} role={role}>
      {label}
    </RoleKey>
  ))
}

const isChannel = (role: string) => role.startsWith('channel-')
