import { ticks } from 'd3-array'
import { eventNumber } from '../event-number.ts'

const width = 936

/**
 * All events as one graduated bar, from the first to the newest. A break and the newest signed head are marked over it;
 * what stands after a break is drawn hollow, since nothing can be said of it.
 */
export function RangeBar({
  events,
  brokenAt,
  head,
}: {
  events: number
  brokenAt: number | null
  head: number | null
}) {
  const at = (sequence: number) => (Math.max(0, Math.min(events, sequence)) / Math.max(events, 1)) * width
  const major = ticks(0, events, 10).filter((tick) => Number.isInteger(tick) && tick > 0)
  const step = (major[1] ?? events) - (major[0] ?? 0)
  const minor = ticks(0, events, 50).filter((tick) => Number.isInteger(tick))
  const checked = brokenAt === null ? events : brokenAt - 1
  // Two labels need room; where they would meet, the break alone is told.
  const close = head !== null && brokenAt !== null && Math.abs(at(head) - at(brokenAt)) < 130
  return (
    <div className="overflow-x-auto">
      <svg
        className="mt-3.5 block h-auto w-full min-w-180 overflow-visible"
        viewBox={`0 0 ${width} 52`}
        width={width}
        height="52"
        role="img"
        aria-label={describe(events, brokenAt, head)}
      >
        <defs>
          <pattern id="ledger-links" width="4" height="10" patternUnits="userSpaceOnUse">
            <rect width="2.6" height="10" fill="var(--hs-ink)" />
          </pattern>
        </defs>
        <rect x="0" y="16" width={at(checked)} height="10" fill="url(#ledger-links)" />
        <rect className="hs-axis" x="0.5" y="15.5" width={width - 1} height="11" />
        <path className="hs-axis" d={`M0 30H${width}${minor.map((tick) => `M${at(tick)} 30v3`).join('')}`} />
        <path className="hs-axis" d={major.map((tick) => `M${at(tick)} 30v6`).join('')} />
        <text className="hs-axis-number" x="0" y="49">
          1
        </text>
        {major
          .filter((tick) => tick > step / 2 && tick < events - step * 0.6)
          .map((tick) => (
            <text key={tick} className="hs-axis-number" x={at(tick)} y="49" textAnchor="middle">
              {eventNumber(tick)}
            </text>
          ))}
        <text className="hs-axis-number" x={width} y="49" textAnchor="end">
          {eventNumber(events)}
        </text>
        {head !== null && !close && (
          <Mark x={at(head)} words={`head at ${eventNumber(head)}`} colour="var(--hs-ink2)" />
        )}
        {brokenAt !== null && (
          <Mark x={at(brokenAt)} words={`breaks at ${eventNumber(brokenAt)}`} colour="var(--hs-fault)" />
        )}
      </svg>
    </div>
  )
}

function Mark({ x, words, colour }: { x: number; words: string; colour: string }) {
  const left = x > width / 2
  return (
    <>
      <path d={`M${x - 4} 3h8l-4 9Z`} fill={colour} />
      <text
        className="text-0"
        x={left ? x - 9 : x + 9}
        y="10"
        textAnchor={left ? 'end' : 'start'}
        fill={colour}
        style={{ font: '11px var(--hs-font-ui)' }}
      >
        {words}
      </text>
    </>
  )
}

function describe(events: number, brokenAt: number | null, head: number | null): string {
  const heads = head === null ? 'no signed head yet' : `signed head at ${head}`
  return brokenAt === null
    ? `All ${events} events checked, ${heads}`
    : `Checked up to event ${brokenAt - 1}, which is the last that holds; ${heads}`
}
