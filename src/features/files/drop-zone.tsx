import { useEffect, useState, type ReactNode } from 'react'

/** Lets files be dropped anywhere on what it holds; the button elsewhere does the same without dragging. */
export function DropZone({
  enabled,
  onFiles,
  children,
}: {
  enabled: boolean
  onFiles: (files: File[]) => void
  children: ReactNode
}) {
  const [over, setOver] = useState(false)

  useEffect(() => {
    if (!enabled) return
    let depth = 0
    const carriesFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false
    function enter(event: DragEvent) {
      if (!carriesFiles(event)) return
      depth += 1
      setOver(true)
    }
    function leave(event: DragEvent) {
      if (!carriesFiles(event)) return
      depth = Math.max(0, depth - 1)
      if (depth === 0) setOver(false)
    }
    function move(event: DragEvent) {
      if (carriesFiles(event)) event.preventDefault()
    }
    function drop(event: DragEvent) {
      if (!carriesFiles(event)) return
      event.preventDefault()
      event.stopPropagation()
      depth = 0
      setOver(false)
      onFiles([...(event.dataTransfer?.files ?? [])])
    }
    // Before the editor sees them, which would otherwise place a dropped picture by itself.
    const options = { capture: true }
    document.addEventListener('dragenter', enter, options)
    document.addEventListener('dragleave', leave, options)
    document.addEventListener('dragover', move, options)
    document.addEventListener('drop', drop, options)
    return () => {
      document.removeEventListener('dragenter', enter, options)
      document.removeEventListener('dragleave', leave, options)
      document.removeEventListener('dragover', move, options)
      document.removeEventListener('drop', drop, options)
    }
  }, [enabled, onFiles])

  return (
    <div className="hs-drop-zone" data-over={over ? '' : undefined}>
      {children}
      {over && (
        <p className="hs-drop-words" aria-hidden>
          Drop to attach to this sheet
        </p>
      )}
    </div>
  )
}
