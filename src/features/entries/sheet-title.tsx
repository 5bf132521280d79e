import { useRef, useState, type KeyboardEvent } from 'react'
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
  if (!editable) return <h1 className="hs-title">{title}</h1>
  return (
    <>
      <h1 className="hs-only-spoken">{title}</h1>
      <TitleField key={title} title={title} onKeep={(text) => change.mutate({ title: text })} />
      {change.isError && (
        <p className="hs-error" role="alert">
          The title was not kept. {sentenceOf(change.error)}
        </p>
      )}
    </>
  )
}

function TitleField({ title, onKeep }: { title: string; onKeep: (text: string) => void }) {
  const field = useRef<HTMLTextAreaElement>(null)
  const [text, setText] = useState(title)

  function keep() {
    const trimmed = text.trim()
    if (trimmed === '') setText(title)
    else if (trimmed !== title) onKeep(trimmed)
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
  )
}
