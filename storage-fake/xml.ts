import { S3Error } from './errors.ts'

const namespace = 'http://s3.amazonaws.com/doc/2006-03-01/'

const entityOf: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&apos;',
}

function escapeText(text: string): string {
  return text
    .replace(/[&<>"']/g, (c) => entityOf[c]!)
    .replace(/\p{Cc}/gu, (c) => `&#x${c.charCodeAt(0).toString(16)};`)
}

/** Content of an element: text, or child elements in order; a list repeats the element, undefined leaves it out. */
export type Content = string | number | boolean | undefined | { [name: string]: Content } | Content[]

function element(name: string, content: Content): string {
  if (content === undefined) return ''
  if (Array.isArray(content)) return content.map((item) => element(name, item)).join('')
  const inner = typeof content === 'object' ? children(content) : escapeText(String(content))
  return `<${name}>${inner}</${name}>`
}

function children(content: { [name: string]: Content }): string {
  return Object.entries(content)
    .map(([name, child]) => element(name, child))
    .join('')
}

/** An XML document with the S3 namespace on its root. */
export function xmlDocument(root: string, content: { [name: string]: Content }): string {
  return `<?xml version="1.0" encoding="UTF-8"?>\n<${root} xmlns="${namespace}">${children(content)}</${root}>`
}

/** An S3 error document (it has no namespace). */
export function errorDocument(code: string, message: string, resource: string, requestId: string): string {
  const body = element('Error', {
    Code: code,
    Message: message,
    Resource: resource,
    RequestId: requestId,
    HostId: 'local',
  })
  return `<?xml version="1.0" encoding="UTF-8"?>\n${body}`
}

export interface XmlElement {
  name: string
  text: string
  children: XmlElement[]
}

const malformed = () =>
  new S3Error('MalformedXML', 'The XML of the request body is not well formed or not of the expected form.')

const namedCharacter: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" }

function unescapeText(text: string): string {
  return text.replace(/&([^;]*);?/g, (_, name: string) => {
    const number = /^#(?:x([0-9a-fA-F]{1,6})|([0-9]{1,7}))$/.exec(name)
    if (number) {
      const point = number[1] === undefined ? Number(number[2]) : parseInt(number[1], 16)
      if (point === 0 || point > 0x10ffff) throw malformed()
      return String.fromCodePoint(point)
    }
    const character = namedCharacter[name]
    if (character === undefined) throw malformed()
    return character
  })
}

/**
 * Reads the small documents that S3 requests carry: elements, text and character references. Document types, CDATA,
 * comments and processing instructions inside the root do not occur in them and are refused (no entity expansion).
 */
export function parseXml(source: string): XmlElement {
  const body = source.replace(/^\uFEFF?\s*(<\?xml[^>]*\?>)?\s*/, '').trimEnd()
  const token = /<(\/?)([A-Za-z_][\w.:-]*)((?:\s+[\w.:-]+\s*=\s*(?:"[^"<]*"|'[^'<]*'))*)\s*(\/?)>|([^<]+)/y
  const open: XmlElement[] = []
  let root: XmlElement | null = null
  while (token.lastIndex < body.length) {
    const match = token.exec(body)
    if (!match || (root && open.length === 0)) throw malformed()
    const [, closing, name, , empty, text] = match
    const parent = open.at(-1)
    if (text !== undefined) {
      if (!parent) throw malformed()
      parent.text += unescapeText(text)
    } else if (closing) {
      if (open.pop()?.name !== name) throw malformed()
    } else {
      const child: XmlElement = { name: name!, text: '', children: [] }
      if (parent) parent.children.push(child)
      else root = child
      if (!empty) open.push(child)
    }
  }
  if (!root || open.length > 0) throw malformed()
  return root
}

/** The root of a request document, which must have the given name. */
export function parseDocument(source: string, rootName: string): XmlElement {
  const root = parseXml(source)
  if (root.name !== rootName) throw malformed()
  return root
}

/** Text of the only child of that name; undefined when there is none. */
export function childText(parent: XmlElement, name: string): string | undefined {
  const found = parent.children.filter((child) => child.name === name)
  if (found.length > 1) throw malformed()
  return found[0]?.text.trim()
}

/** The only child of that name; undefined when there is none. */
export function childElement(parent: XmlElement, name: string): XmlElement | undefined {
  const found = parent.children.filter((child) => child.name === name)
  if (found.length > 1) throw malformed()
  return found[0]
}
