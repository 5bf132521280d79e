/** True when two byte strings are the same; for public values only (it stops at the first difference). */
export function sameBytes(a: Uint8Array, b: Uint8Array): boolean {
  return a.length === b.length && a.every((byte, i) => byte === b[i])
}

/** Position of `wanted` in `bytes` at or after `from`, else -1. */
export function indexOfBytes(bytes: Uint8Array, wanted: Uint8Array, from = 0): number {
  const first = wanted[0]
  if (first === undefined) return from
  for (let at = bytes.indexOf(first, from); at >= 0; at = bytes.indexOf(first, at + 1)) {
    if (at + wanted.length > bytes.length) return -1
    let same = 1
    while (same < wanted.length && bytes[at + same] === wanted[same]) same++
    if (same === wanted.length) return at
  }
  return -1
}
