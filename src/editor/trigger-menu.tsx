import type { Editor } from '@tiptap/react'
import { useEditorState } from '@tiptap/react'
import { useEffect, useId, useRef, useState } from 'react'
import { useEditorParts } from './editor-parts.ts'
import { figureItems, insertItems, matching, type MenuItem } from './menu-items.ts'
import { triggerAt, type Trigger } from './trigger.ts'

/** The menu at the cursor behind `/` and `=`: arrows choose, Enter takes, Esc closes it until the next sign. */
export function TriggerMenu({ editor }: { editor: Editor }) {
  const parts = useEditorParts()
  const trigger = useEditorState({
    editor,
    selector: ({ editor: now }) => (now.isFocused && now.isEditable ? triggerAt(now.state) : null),
    equalityFn: sameTrigger,
  })
  const [closedAt, setClosedAt] = useState<number | null>(null)
  const query = trigger?.query ?? ''
  const [choice, setChoice] = useState({ query, at: 0 })
  const chosen = choice.query === query ? choice.at : 0
  const items = trigger
    ? matching(trigger.kind === 'insert' ? insertItems(parts) : figureItems(parts), query)
    : []
  const open = trigger !== null && trigger.from !== closedAt && (items.length > 0 || query === '')

  useEffect(() => {
    const forget = () => {
      if (triggerAt(editor.state) === null) setClosedAt(null)
    }
    editor.on('transaction', forget)
    return () => {
      editor.off('transaction', forget)
    }
  }, [editor])

  function take(item: MenuItem) {
    if (!trigger) return
    editor.chain().deleteRange({ from: trigger.from, to: trigger.to }).run()
    item.run(editor)
  }

  useMenuKeys(editor, open, {
    move: (by) =>
      setChoice({ query, at: items.length === 0 ? 0 : (chosen + by + items.length) % items.length }),
    take: () => {
      const item = items[chosen]
      if (item) take(item)
      return item !== undefined
    },
    close: () => setClosedAt(trigger?.from ?? null),
  })

  if (!open || !trigger) return null
  return <MenuList editor={editor} trigger={trigger} items={items} chosen={chosen} onTake={take} />
}

interface MenuListProps {
  editor: Editor
  trigger: Trigger
  items: MenuItem[]
  chosen: number
  onTake: (item: MenuItem) => void
}

function MenuList({ editor, trigger, items, chosen, onTake }: MenuListProps) {
  const id = useId()
  const current = useRef<HTMLLIElement>(null)
  useEffect(() => {
    current.current?.scrollIntoView({ block: 'nearest' })
  }, [chosen])
  const at = editor.view.coordsAtPos(trigger.from)
  const below = at.bottom + Math.min(290, 16 + 46 * items.length) < window.innerHeight
  const style = {
    left: Math.min(at.left, window.innerWidth - 340),
    ...(below ? { top: at.bottom + 6 } : { bottom: window.innerHeight - at.top + 6 }),
  }
  return (
    <div className="hs-popup hs-trigger-menu" style={style}>
      <ul role="listbox" aria-label={trigger.kind === 'insert' ? 'Insert' : 'Quote a result'}>
        {items.map((item, index) => (
          <li
            key={item.key}
            id={`${id}-${index}`}
            ref={index === chosen ? current : undefined}
            role="option"
            aria-selected={index === chosen}
            className="hs-popup-item hs-popup-plain"
            data-highlighted={index === chosen ? '' : undefined}
            // Before the editor loses the focus and with it the place.
            onMouseDown={(event) => {
              event.preventDefault()
              onTake(item)
            }}
          >
            <span>
              {item.label}
              {item.note && <small>{item.note}</small>}
            </span>
          </li>
        ))}
      </ul>
      {items.length === 0 && (
        <p className="hs-popup-note">
          {trigger.kind === 'figure'
            ? 'No calculation of this sheet has a result yet.'
            : 'Nothing of that name can be inserted.'}
        </p>
      )}
      <output className="hs-only-spoken">{items[chosen]?.label}</output>
    </div>
  )
}

interface MenuKeys {
  move: (by: -1 | 1) => void
  take: () => boolean
  close: () => void
}

/** Keys of the open menu, taken before the editor sees them. */
function useMenuKeys(editor: Editor, open: boolean, keys: MenuKeys): void {
  const latest = useRef(keys)
  useEffect(() => {
    latest.current = keys
  })
  useEffect(() => {
    if (!open) return
    const element = editor.view.dom
    function onKeyDown(event: KeyboardEvent) {
      const { move, take, close } = latest.current
      if (event.key === 'ArrowDown') move(1)
      else if (event.key === 'ArrowUp') move(-1)
      else if (event.key === 'Escape') close()
      else if ((event.key !== 'Enter' && event.key !== 'Tab') || !take()) return
      event.preventDefault()
      event.stopPropagation()
    }
    element.addEventListener('keydown', onKeyDown, { capture: true })
    return () => element.removeEventListener('keydown', onKeyDown, { capture: true })
  }, [editor, open])
}

function sameTrigger(one: Trigger | null, other: Trigger | null | undefined): boolean {
  return one?.from === other?.from && one?.query === other?.query && one?.kind === other?.kind
}
