/** ETag of an entry's text: number of the save and the first 16 digits of its digest, strong. */
export function contentTag(saveNumber: number, sha256: string): string {
  return `"${saveNumber}-${sha256.slice(0, 16)}"`
}

/** If-Match by strong comparison (RFC 9110 section 13.1.1): `*` or a list of tags; a weak tag never matches. */
export function tagMatches(ifMatch: string, current: string): boolean {
  if (ifMatch.trim() === '*') return true
  return ifMatch.split(',').some((tag) => tag.trim() === current)
}
