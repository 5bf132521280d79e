import { useQuery } from '@tanstack/react-query'
import { figureQuery } from '../../features/calculations/queries.ts'
import { Preview } from '../../plots/preview.tsx'

/** The curve of a calculation without axes: the first panel's first series, with its first level line. */
export function CurvePreview({ calculationId }: { calculationId: string }) {
  const { data: figure } = useQuery(figureQuery(calculationId, 'latest'))
  const panel = figure?.panels[0]
  const series = panel?.series.find((each) => each.mark === 'points') ?? panel?.series[0]
  if (!panel || !series) return null
  return (
    <Preview
      x={series.x}
      y={series.y}
      reference={panel.references.find(({ axis }) => axis === 'y')?.at ?? null}
    />
  )
}
