import { useEffect, type RefObject } from 'react'

/** Below this width marginalia follow the text instead of standing beside it. */
const beside = '(min-width: 701px)'
const gap = 12

/**
 * Hangs what stands in the margin at the first line of its block: each child names in `data-beside` the ids of blocks it
 * belongs to and is moved down to the first of them; it never moves over the one before it.
 */
export function useBeside(row: RefObject<HTMLElement | null>): void {
  useEffect(() => {
    const text = row.current?.querySelector<HTMLElement>('.hs-row-text')
    const margin = row.current?.querySelector<HTMLElement>('.hs-row-margin')
    if (!text || !margin) return
    const wide = window.matchMedia(beside)
    const place = () => placeBeside(margin, wide.matches)
    const sizes = new ResizeObserver(place)
    sizes.observe(text)
    const children = new MutationObserver(place)
    children.observe(margin, { childList: true, subtree: true, attributeFilter: ['data-beside'] })
    wide.addEventListener('change', place)
    return () => {
      sizes.disconnect()
      children.disconnect()
      wide.removeEventListener('change', place)
    }
  }, [row])
}

function placeBeside(margin: HTMLElement, wide: boolean): void {
  const top = margin.getBoundingClientRect().top
  let free = 0
  for (const child of margin.children) {
    if (!(child instanceof HTMLElement)) continue
    child.style.marginTop = ''
    const blocks = wide
      ? (child.dataset.beside ?? '').split(' ').flatMap((id) => document.getElementById(id) ?? [])
      : []
    const wanted = Math.min(...blocks.map((block) => block.getBoundingClientRect().top - top))
    const at = Number.isFinite(wanted) ? Math.max(free, wanted) : free
    if (at > free) child.style.marginTop = `${at - free}px`
    free = at + child.offsetHeight + gap
  }
}
