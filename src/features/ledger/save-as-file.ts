/** Hands bytes to the person as a file of this name. */
export function saveAsFile(bytes: Uint8Array, name: string, type: string): void {
  const url = URL.createObjectURL(new Blob([bytes.slice()], { type }))
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  // The browser has taken the bytes over when the press returns; a later turn gives up our hold on them.
  setTimeout(() => URL.revokeObjectURL(url))
}
