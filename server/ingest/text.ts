/** Text of bytes: UTF-8, or Latin-1 where they are not valid UTF-8 (old programs write µ so). */
export function decodeText(bytes: Uint8Array): string {
  let ascii = true
  let text = ''
  for (let i = 0; i < bytes.length; i += 4096) {
    const piece = bytes.subarray(i, i + 4096)
    ascii &&= piece.every((byte) => byte < 0x80)
    text += String.fromCharCode(...piece)
  }
  if (ascii) return text
  try {
    return decodeURIComponent(
      text.replace(/[^A-Za-z0-9]/g, (c) => `%${c.charCodeAt(0).toString(16).padStart(2, '0')}`),
    )
  } catch {
    return text
  }
}

/** Where the text begins: behind a UTF-8 byte order mark, if there is one. */
export function textStart(bytes: Uint8Array): number {
  return bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0
}

/**
 * Why bytes are not text that can be read here; null when they may be. The beginning of a file is enough.
 */
export function notText(head: Uint8Array): string | null {
  const [a, b] = head
  if ((a === 0xff && b === 0xfe) || (a === 0xfe && b === 0xff)) {
    return 'The text is UTF-16: save it as UTF-8 or plain text.'
  }
  const control = head.some(
    (byte) => byte < 0x20 && byte !== 0x09 && byte !== 0x0a && byte !== 0x0d && byte !== 0x0c,
  )
  return control ? 'The file is not text: it holds control bytes.' : null
}
