import type { Editor } from '@tiptap/react'
import { useEffect } from 'react'
import type { ContentSaver } from '../../features/entries/content-saver.ts'
import { fetchContent } from '../../features/entries/queries.ts'

/** On coming back to the window: when nothing here is unsaved and another text was saved meanwhile, that one is shown. */
export function useFollowServer(entryId: string, editor: Editor | null, saver: ContentSaver): void {
  useEffect(() => {
    if (!editor) return
    async function look() {
      if (saver.hasUnsaved() || saver.getState().name !== 'saved') return
      const theirs = await fetchContent(entryId).catch(() => null)
      if (!theirs || theirs.etag === saver.getEtag() || saver.hasUnsaved()) return
      editor?.commands.setContent(theirs.document, { emitUpdate: false })
      saver.adopt(theirs.etag)
    }
    const onFocus = () => void look()
    window.addEventListener('focus', onFocus)
    return () => window.removeEventListener('focus', onFocus)
  }, [entryId, editor, saver])
}
