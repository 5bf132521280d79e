import { queryOptions } from '@tanstack/react-query'
import { problemFrom } from '../../lib/api-problem.ts'
import { personActive } from '../../lib/person-active.ts'
import { urlOf } from '../../lib/url-of.ts'

const wanted = 4096

/** The first bytes of a raw file, by a range request: the witness's own GET, from which the server knows it was opened. */
export function firstBytesQuery(file: { id: string; size: number }, onOpened: () => void) {
  return queryOptions({
    queryKey: ['files', file.id, 'first-bytes'] as const,
    queryFn: async ({ signal }) => {
      const response = await fetch(urlOf('getFileContent', { id: file.id }), {
        headers: { ...personActive(), ...(file.size > wanted ? { Range: `bytes=0-${wanted - 1}` } : {}) },
        credentials: 'same-origin',
        signal,
      })
      if (!response.ok) throw problemFrom(response.status, await response.json().catch(() => null))
      const bytes = new Uint8Array(await response.arrayBuffer()).slice(0, wanted)
      onOpened()
      return bytes
    },
    staleTime: 0,
    gcTime: 0,
  })
}

/** The bytes as lines of text, or null when they are not text. The last line may be cut and is left out. */
export function linesOf(bytes: Uint8Array): string[] | null {
  const text = new TextDecoder('utf-8').decode(bytes)
  // eslint-disable-next-line no-control-regex -- control characters are what tells a binary file
  const binary = text.match(/[\u0000-\u0008\u000e-\u001f\ufffd]/g)?.length ?? 0
  if (binary > 1) return null
  const lines = text.split(/\r?\n/)
  return bytes.length < wanted ? lines : lines.slice(0, -1)
}
