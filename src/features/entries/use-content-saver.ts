import { useEffect, useState, useSyncExternalStore } from 'react'
import type { NormalDocument } from '../../../server/document/index.ts'
import { call, callForAnswer } from '../../lib/call.ts'
import { ContentSaver } from './content-saver.ts'

/** The saver of one open sheet, tied to its page: it saves when the page hides and cuts a revision on leaving. */
export function useContentSaver(entryId: string, etag: string, document: () => NormalDocument) {
  const [saver] = useState(() => createSaver(entryId, etag, document))
  useEffect(() => saver.readFrom(document), [saver, document])
  const state = useSyncExternalStore(saver.subscribe, saver.getState)

  useEffect(() => {
    const hide = () => window.document.visibilityState === 'hidden' && saver.pageHides()
    const gone = () => saver.pageHides()
    const warn = (event: BeforeUnloadEvent) => {
      const name = saver.getState().name
      if (saver.hasUnsaved() && (name === 'offline' || name === 'conflict' || name === 'refused'))
        event.preventDefault()
    }
    window.document.addEventListener('visibilitychange', hide)
    window.addEventListener('pagehide', gone)
    window.addEventListener('beforeunload', warn)
    return () => {
      window.document.removeEventListener('visibilitychange', hide)
      window.removeEventListener('pagehide', gone)
      window.removeEventListener('beforeunload', warn)
    }
  }, [saver])

  return { saver, state }
}

function createSaver(id: string, etag: string, document: () => NormalDocument): ContentSaver {
  return new ContentSaver(
    {
      put: async (content, ifMatch, keepalive) => {
        const answer = await callForAnswer('putContent', {
          params: { id },
          body: { ...content },
          ifMatch,
          keepalive,
        })
        return { etag: answer.etag ?? '*', savedAt: answer.reply.savedAt }
      },
      currentEtag: async () => (await callForAnswer('getContent', { params: { id } })).etag ?? '*',
      cutRevision: async (cause, keepalive) => {
        await call('cutRevision', { params: { id }, body: { cause }, keepalive })
      },
    },
    etag,
    document,
  )
}
