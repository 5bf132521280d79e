import { classNames } from './class-names.ts'

const dayWidth = 8
const days = 14

/** "17 hours", "9 days, 2 over". */
export function waitingWords(waited: number, limit: number): string {
  if (waited < 1) {
    const hours = Math.max(1, Math.floor(waited * 24))
    return `${hours} ${hours === 1 ? 'hour' : 'hours'}`
  }
  const whole = Math.floor(waited)
  const over = Math.floor(waited - limit)
  return `${whole} ${whole === 1 ? 'day' : 'days'}${waited > limit ? `, ${over < 1 ? 'just' : over} over` : ''}`
}

/** How long something waits, in days, on a scale of fourteen with a tick at the limit. */
export function WaitingScale({ waited, limit = 7 }: { waited: number; limit?: number }) {
  const over = waited > limit
  const ticks = Array.from(
    { length: days + 1 },
    (_, at) => `M${at * dayWidth} 13v${at % limit === 0 ? 6 : 3}`,
  )
  return (
    <span className={classNames('hs-waiting', over && 'hs-waiting-over')}>
      <svg className="hs-scale" width="114" height="20" viewBox="-1 0 114 20" aria-hidden>
        <path className="hs-axis" d={`${ticks.join('')}M0 13H${days * dayWidth}`} />
        <rect
          className="hs-waiting-bar"
          x="0"
          y="5"
          width={Math.min(Math.max(waited * dayWidth, 2), days * dayWidth)}
          height="6"
        />
        {over && <path className="hs-waiting-limit" d={`M${limit * dayWidth} 2V13`} />}
      </svg>
      <span className="hs-scale-words">{waitingWords(waited, limit)}</span>
    </span>
  )
}
