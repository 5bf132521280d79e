import type { Figure } from '../../server/contract/figure.ts'
import { AxisTitle } from './axis-title.tsx'
import { axisGap, ticksOf, type FigureLayout, type PanelLayout, type Tick } from './figure-layout.ts'
import { axisNumber } from './numbers.ts'

const round = (value: number) => Math.round(value * 100) / 100

/** The x axis below all panels: ticks outward, title at its right end. */
export function XAxis({ figure, layout }: { figure: Figure; layout: FigureLayout }) {
  const { x, left, right, axisTop } = layout
  const ticks = ticksOf(x, figure.x, Math.max(2, Math.round((right - left) / 76)))
  const d = ticks.map((tick) => `M${round(x(tick.at))} ${axisTop}v${tick.major ? 6 : 3}`).join('')
  return (
    <>
      <path className="hs-axis" d={`M${left} ${axisTop}H${right}${d}`} />
      {labelled(ticks).map((tick) => (
        <text
          key={tick.at}
          className="hs-axis-number"
          x={round(x(tick.at))}
          y={axisTop + 18}
          textAnchor="middle"
        >
          {axisNumber(tick.text)}
        </text>
      ))}
      <text className="hs-axis-title" x={right} y={axisTop + 35} textAnchor="end">
        <AxisTitle axis={figure.x} />
      </text>
    </>
  )
}

/** A panel's y axis. A strip has three signed ticks and its title as a note at the right. */
export function YAxis({ placed, layout }: { placed: PanelLayout; layout: FigureLayout }) {
  const { panel, top, height, y, strip } = placed
  const across = layout.left - axisGap
  const ticks = strip ? stripTicks(placed) : ticksOf(y, panel.y, Math.max(3, Math.round(height / 40)))
  const d = ticks.map((tick) => `M${across} ${round(y(tick.at))}h${tick.major ? -6 : -3}`).join('')
  const title = <AxisTitle axis={panel.y} symbolOnly={!strip && layout.width < 480} />
  return (
    <>
      <path className="hs-axis" d={`M${across} ${top}V${top + height}${d}`} />
      {labelled(ticks).map((tick) => (
        <text
          key={tick.at}
          className="hs-axis-number"
          x={across - 10}
          y={round(y(tick.at)) + 4}
          textAnchor="end"
        >
          {axisNumber(tick.text)}
        </text>
      ))}
      {strip ? (
        <text className="hs-plot-note" x={layout.right} y={top + 9} textAnchor="end">
          {title}
        </text>
      ) : (
        <text className="hs-axis-title" x={layout.left + 2} y={top + 2}>
          {title}
        </text>
      )}
    </>
  )
}

/** The ends of the ground band (±2 of residuals) and zero; without a band, the usual ticks. */
function stripTicks({ panel, y }: PanelLayout): Tick[] {
  if (!panel.ground) return ticksOf(y, panel.y, 2)
  const [low, high] = panel.ground
  const signed = (at: number) => (at > 0 ? `+${at}` : String(at))
  return [
    { at: low, major: true, text: signed(low) },
    { at: 0, major: false, text: null },
    { at: high, major: true, text: signed(high) },
  ]
}

function labelled(ticks: Tick[]): (Tick & { text: string })[] {
  return ticks.filter((tick): tick is Tick & { text: string } => tick.text !== null)
}
