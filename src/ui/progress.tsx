import type { CSSProperties, ReactNode } from 'react'

/** Seconds left in words: "about 40 s left", "about 3 min left". Null when it cannot be told. */
export function timeLeft(done: number, total: number, perSecond: number | null): string | null {
  if (!perSecond || perSecond <= 0 || total <= 0 || done >= total) return null
  const seconds = (total - done) / perSecond
  if (seconds < 90) return `about ${Math.max(1, Math.round(seconds))} s left`
  if (seconds < 5400) return `about ${Math.round(seconds / 60)} min left`
  return `about ${Math.round(seconds / 3600)} h left`
}

/** How far a piece of work has come: a bar of blocks and words. `share` from 0 to 1, null when it is not known. */
export function Progress({
  label,
  share,
  words,
}: {
  label: string
  share: number | null
  words?: ReactNode
}) {
  const percent = share === null ? null : Math.round(Math.min(1, Math.max(0, share)) * 100)
  return (
    <div>
      <div
        className="hs-progress-bar"
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent ?? undefined}
        style={{ '--hs-done': `${percent ?? 0}%` } as CSSProperties}
      >
        <i />
      </div>
      {words && <p className="hs-progress-words">{words}</p>}
    </div>
  )
}
