import { useEffect, useState } from 'react'
import { clockTimeWithSeconds } from '../../lib/times.ts'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import type { SaveState } from './content-saver.ts'

/** Whether what is on the screen is safe, always in sight. */
export function SaveStateLine({ state }: { state: SaveState }) {
  return (
    <span className="hs-save-state" role="status" data-save={state.name}>
      <SaveWords state={state} />
    </span>
  )
}

function SaveWords({ state }: { state: SaveState }) {
  switch (state.name) {
    case 'saved':
      return state.at === null ? 'saved' : `saved ${clockTimeWithSeconds(state.at)}`
    case 'unsaved':
    case 'saving':
      return 'saving'
    case 'offline':
      return (
        <StateGlyph state="fault">Not saved since {clockTimeWithSeconds(new Date(state.since))}</StateGlyph>
      )
    case 'conflict':
      return <StateGlyph state="fault">Not saved: someone else saved first</StateGlyph>
    case 'refused':
      return <StateGlyph state="fault">Not saved</StateGlyph>
  }
}

/** Seconds until the next try, counting down. */
export function useSecondsUntil(time: number): number {
  const [now, setNow] = useState(Date.now)
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), 1000)
    return () => clearInterval(timer)
  }, [])
  return Math.max(0, Math.ceil((time - now) / 1000))
}
