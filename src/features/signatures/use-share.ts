import { useCallback, useState } from 'react'

const steps = 40

/**
 * How far the opening of a key has come, in steps that are worth drawing: the derivation tells of it ten thousand times.
 * `null` when nothing runs.
 */
export function useShare() {
  const [share, setShare] = useState<number | null>(null)
  const tell = useCallback(
    (now: number | null) => setShare(now === null ? null : Math.floor(now * steps) / steps),
    [],
  )
  return [share, tell] as const
}
