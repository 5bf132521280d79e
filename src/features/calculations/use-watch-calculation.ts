import { useQueryClient } from '@tanstack/react-query'
import { useEffect } from 'react'
import { queryKeys } from '../../lib/query-keys.ts'
import { urlOf } from '../../lib/url-of.ts'

/** Follows a calculation that goes on, by server-sent events; what an event says is read anew from the calculation. */
export function useWatchCalculation(id: string, entryId: string | undefined, goingOn: boolean): void {
  const client = useQueryClient()
  useEffect(() => {
    if (!goingOn) return
    const source = new EventSource(urlOf('watchCalculation', { id }))
    const look = () => void client.invalidateQueries({ queryKey: queryKeys.calculation(id), exact: true })
    for (const name of ['message', 'progress', 'outcome', 'done', 'failed', 'cancelled'])
      source.addEventListener(name, look)
    return () => source.close()
  }, [client, id, goingOn])

  useEffect(() => {
    // The entry tells what blocks signing: it is out of date once a calculation has ended.
    if (!goingOn && entryId)
      void client.invalidateQueries({ queryKey: queryKeys.entry(entryId), exact: true })
  }, [client, entryId, goingOn])
}
