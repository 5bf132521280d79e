import { useCallback, useRef, type ReactNode } from 'react'

/** A hidden field that asks this computer for files: what opens it, and the field to put somewhere on the page. */
export function useFileField(
  onFiles: (files: File[]) => void,
  accept?: string,
): { open: () => void; field: ReactNode } {
  const field = useRef<HTMLInputElement>(null)
  const open = useCallback(() => field.current?.click(), [])
  return {
    open,
    field: (
      <input
        ref={field}
        type="file"
        hidden
        multiple={accept === undefined}
        accept={accept}
        onChange={({ target }) => {
          onFiles([...(target.files ?? [])])
          // The same file may be chosen again.
          target.value = ''
        }}
      />
    ),
  }
}
