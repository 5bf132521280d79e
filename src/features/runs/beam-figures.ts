import type { Experiment } from '../../../server/contract/common.ts'
import type { Entry } from '../../../server/contract/entries.ts'
import type { FigureText } from '../../../server/contract/calculations.ts'
import type { Run } from '../../../server/contract/runs.ts'
import { figureWithoutUnit, unitText } from '../../lib/format-quantity.ts'
import type { BeamNode } from '../../plots/beam-path/beam-path.tsx'
import type { BeamVariant, NodeId } from '../../plots/beam-path/variants.ts'

const variants: Record<Experiment, BeamVariant | null> = {
  hbt: 'hbt',
  'hbt-pulsed': 'hbt',
  chaotic: 'hbt',
  heralded: 'her',
  dip: 'dip',
  fringe: null,
  polarisation: 'pol',
  calibration: null,
  other: null,
}

/** The set-up of an experiment; null where there is no usual one. */
export const variantOf = (experiment: Experiment): BeamVariant | null => variants[experiment]

export type BeamNodes = Partial<Record<NodeId, BeamNode>>

/** Whether the nodes carry any measured figure: without one the set-up stands empty, its shutter closed. */
export const hasFigures = (nodes: BeamNodes): boolean => nodes['detector-1']?.figure !== undefined

/**
 * What stands at the nodes of a set-up: names from the run's apparatus, and the figures that calculations report as rates
 * of channels, coincidences and accidentals; of several, the latest.
 */
export function beamNodes(entry: Entry, run: Run | undefined, variant: BeamVariant): BeamNodes {
  const figures = entry.calculations
    .filter((calculation) => calculation.status === 'done' && !calculation.stale)
    .flatMap((calculation) => calculation.figures)
  const latest = (label: RegExp) => figures.findLast((figure) => label.test(figure.label))
  const channels = channelsIn(figures)
  const slots: NodeId[] =
    variant === 'her' ? ['herald', 'detector-1', 'detector-2'] : ['detector-1', 'detector-2']
  const nodes: BeamNodes = { source: pieceNode(run, 'source', 'Source') ?? { label: 'Source' } }
  const filter = pieceNode(run, 'filter', 'Filter')
  const splitter = pieceNode(run, 'splitter', 'Splitter')
  if (filter) nodes.filter = filter
  if (splitter) nodes.splitter = splitter
  slots.forEach((slot, at) => {
    const channel = channels[at]
    const rate = channel === undefined ? undefined : latest(rateOf(channel))
    nodes[slot] = {
      label: `${detectorName(run, channel) ?? `Channel ${channel ?? at + 1}`}, W`,
      sub: '1',
      ...withFigure(rate),
    }
  })
  nodes.coincidence = { label: 'Coincidence W', sub: '2', ...withFigure(latest(/^W2\b/)) }
  const accidentals = latest(/^accidentals/i)
  if (accidentals) nodes.extra = { label: 'Accidentals', ...withFigure(accidentals) }
  return nodes
}

const rateOf = (channel: number) => new RegExp(`^R ch ${channel}$`)

function channelsIn(figures: FigureText[]): number[] {
  const found = figures.flatMap(({ label }) => /^R ch (\d+)$/.exec(label)?.[1] ?? [])
  return [...new Set(found.map(Number))].sort((one, two) => one - two)
}

/** A piece of the run's equipment with the first of its figures; null when the run names none. */
function pieceNode(run: Run | undefined, kind: string, word: string): BeamNode | null {
  const piece = run?.apparatus.find((each) => each.kind === kind)
  if (!piece) return null
  const figure = piece.figures[0]
  return {
    label: `${word} ${piece.name}`,
    ...withFigure(figure && { ...figure, pointer: '', label: figure.name }),
  }
}

function detectorName(run: Run | undefined, channel: number | undefined): string | undefined {
  return run?.apparatus.find((piece) => piece.kind === 'detector' && piece.channel === channel)?.name
}

function withFigure(figure: FigureText | undefined): Pick<BeamNode, 'figure' | 'more'> {
  if (!figure) return {}
  const unit = unitText(figure.unit)
  return {
    figure: figureWithoutUnit({ value: figure.value, u: null }),
    more: [figure.u !== null && `± ${figureWithoutUnit({ value: figure.u, u: null })}`, unit]
      .filter(Boolean)
      .join(' '),
  }
}
