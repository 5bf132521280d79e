import { useEffect, useRef, useState, type KeyboardEvent } from 'react'
import { sentenceOf } from '../../lib/api-problem.ts'
import { useChangeEntry } from './mutations.ts'

/** The title of a sheet; in a draft it is written in place. Enter or leaving keeps it, Esc restores it. */
export function SheetTitle({
  entryId,
  title,
  editable,
}: {
  entryId: string
  title: string
  editable: boolean
}) {
  const change = useChangeEntry(entryId)
  const field = useRef<HTMLTextAreaElement>(null)
  const [text, setText] = useState(title)
  useEffect(() => setText(title), [title])

  if (!editable) return <h1 className="hs-title">{title}</h1>

  function keep() {
    const trimmed = text.trim()
    if (trimmed === '') setText(title)
    else if (trimmed !== title) change.mutate({ title: trimmed })
  }

  function onKeyDown(event: KeyboardEvent) {
    if (event.key === 'Enter') {
      event.preventDefault()
      field.current?.blur()
    }
    if (event.key === 'Escape') {
      setText(title)
      requestAnimationFrame(() => field.current?.blur())
    }
  }

  return (
    <>
      <h1 className="hs-only-spoken">{title}</h1>
      <div className="hs-title hs-title-field" data-text={text}>
        <textarea
          ref={field}
          aria-label="Title of the sheet"
          rows={1}
          maxLength={300}
          value={text}
          onChange={(event) => setText(event.target.value.replace(/\n/g, ' '))}
          onKeyDown={onKeyDown}
          onBlur={keep}
        />
      </div>
      {change.isError && (
        <p className="hs-error" role="alert">
          The title was not kept. {sentenceOf(change.error)}
        </p>
      )}
    </>
  )
}
