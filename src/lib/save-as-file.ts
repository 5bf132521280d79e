/** Gives bytes or text to the person as a file. */
export function saveAsFile(content: Uint8Array | string, name: string, type: string): void {
  const url = URL.createObjectURL(new Blob([content as BlobPart], { type }))
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  // The browser has taken the bytes by the next turn.
  setTimeout(() => URL.revokeObjectURL(url), 1000)
}
