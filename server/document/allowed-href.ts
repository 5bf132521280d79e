const outside = /^(https?:\/\/[^\s<>"]+|mailto:[^\s<>"]+)$/i
const uuid = '[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}'
const inside = new RegExp(`^(/(entries|notebooks|runs|files)/${uuid})?(#[A-Za-z0-9_-]{1,64})?$`)

/** Whether a link may point there: http, https, mailto, or an id of our own (`/entries/<uuid>`, `#<node id>`). */
export function isAllowedHref(href: string): boolean {
  return href.length > 0 && href.length <= 2000 && (outside.test(href) || inside.test(href))
}
