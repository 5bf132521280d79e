import { useEffect, useRef } from 'react'

/**
 * Keys of the page by name: "?", "e", "g b" (one after the other), "ctrl k". Nothing fires while the reader types in a
 * field; without `single`, only those with ctrl do.
 */
export function useKeys(
  bindings: Record<string, () => void>,
  { single = true }: { single?: boolean } = {},
): void {
  const latest = useRef(bindings)
  useEffect(() => {
    latest.current = bindings
  })
  useEffect(() => {
    let before = ''
    let beforeAt = 0
    function onKeyDown(event: KeyboardEvent) {
      if (event.defaultPrevented || event.altKey || event.key === 'Shift') return
      const ctrl = event.ctrlKey || event.metaKey
      if (!ctrl && (!single || isTyping(event.target))) return
      const key = ctrl ? `ctrl ${event.key.toLowerCase()}` : event.key
      const pair = event.timeStamp - beforeAt < 1200 ? `${before} ${key}` : key
      const act = latest.current[pair] ?? latest.current[key]
      before = key
      beforeAt = event.timeStamp
      if (!act) return
      event.preventDefault()
      act()
    }
    document.addEventListener('keydown', onKeyDown)
    return () => document.removeEventListener('keydown', onKeyDown)
  }, [single])
}

function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false
  return (
    target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName) || target.role === 'textbox'
  )
}
