import type { z } from 'zod'
import { markAttributes, nodeAttributes } from './attributes.ts'
import { DocumentError } from './document-error.ts'

/** Deeper nesting than any real text has; below the depth at which recursion over the tree could fail. */
const maxDepth = 100
const maxNodes = 50_000
const maxCharacters = 2_000_000

const nodeMembers = new Set(['type', 'attrs', 'content', 'marks', 'text'])
const markMembers = new Set(['type', 'attrs'])
const loneSurrogateOrNul = /\p{Surrogate}|\0/u

interface Visit {
  value: unknown
  pointer: string
  depth: number
}

/**
 * Walks untrusted JSON before the schema sees it and refuses what the schema would silently drop or recurse into:
 * unknown members, unknown or wrong attributes, broken characters, documents too deep or too large.
 * The walk keeps its own stack, so that no input can overflow ours.
 */
export function inspect(document: unknown): void {
  const waiting: Visit[] = [{ value: document, pointer: '', depth: 0 }]
  let nodes = 0
  let characters = 0
  for (let visit = waiting.pop(); visit; visit = waiting.pop()) {
    const { value, pointer, depth } = visit
    if (depth > maxDepth)
      throw new DocumentError(pointer, `The text is nested deeper than ${maxDepth} levels.`)
    if (++nodes > maxNodes) throw new DocumentError(pointer, `The text has more than ${maxNodes} parts.`)
    const node = readNode(value, pointer)
    characters += node.characters
    if (characters > maxCharacters) {
      throw new DocumentError(pointer, `The text is longer than ${maxCharacters} characters.`)
    }
    node.content.forEach((child, at) =>
      waiting.push({ value: child, pointer: `${pointer}/content/${at}`, depth: depth + 1 }),
    )
  }
}

function readNode(value: unknown, pointer: string): { content: unknown[]; characters: number } {
  const node = readObject(value, pointer, nodeMembers)
  const type = readType(node.type, pointer, nodeAttributes, 'part of a text')
  checkAttributes(nodeAttributes[type]!, node.attrs, `${pointer}/attrs`)
  const text = node.text
  if ((type === 'text') !== (text !== undefined)) {
    throw new DocumentError(`${pointer}/text`, 'Text stands in text nodes and nowhere else.')
  }
  if (text !== undefined) checkText(text, `${pointer}/text`)
  for (const [at, mark] of readList(node.marks, `${pointer}/marks`).entries()) {
    const markPointer = `${pointer}/marks/${at}`
    const { type: markType, attrs } = readObject(mark, markPointer, markMembers)
    const name = readType(markType, markPointer, markAttributes, 'emphasis of a text')
    checkAttributes(markAttributes[name]!, attrs, `${markPointer}/attrs`)
  }
  return {
    content: readList(node.content, `${pointer}/content`),
    characters: (typeof text === 'string' ? text.length : 0) + JSON.stringify(node.attrs ?? null).length,
  }
}

function readObject(value: unknown, pointer: string, members: Set<string>): Record<string, unknown> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new DocumentError(pointer, 'An object is expected here.')
  }
  const unknown = Object.keys(value).find((member) => !members.has(member))
  if (unknown !== undefined) throw new DocumentError(`${pointer}/${unknown}`, 'This member is not known.')
  return value as Record<string, unknown>
}

function readType(type: unknown, pointer: string, known: Record<string, unknown>, what: string): string {
  if (typeof type === 'string' && Object.hasOwn(known, type)) return type
  throw new DocumentError(`${pointer}/type`, `${JSON.stringify(type)?.slice(0, 80)} is not a known ${what}.`)
}

function readList(value: unknown, pointer: string): unknown[] {
  if (value === undefined) return []
  if (Array.isArray(value)) return value
  throw new DocumentError(pointer, 'A list is expected here.')
}

function checkText(text: unknown, pointer: string): void {
  if (typeof text !== 'string') throw new DocumentError(pointer, 'Text is expected here.')
  if (text === '') throw new DocumentError(pointer, 'A text node cannot be empty.')
  if (loneSurrogateOrNul.test(text)) throw new DocumentError(pointer, 'The text holds a broken character.')
}

function checkAttributes(schema: z.ZodType, attrs: unknown, pointer: string): void {
  const parsed = schema.safeParse(attrs ?? {})
  if (!parsed.success) {
    const issue = parsed.error.issues[0]
    const at = [pointer, ...(issue?.path ?? [])].join('/')
    throw new DocumentError(at, `This attribute does not fit: ${issue?.message ?? 'unknown reason'}.`)
  }
  for (const [name, value] of Object.entries(attrs ?? {})) {
    if (typeof value === 'string' && loneSurrogateOrNul.test(value)) {
      throw new DocumentError(`${pointer}/${name}`, 'The attribute holds a broken character.')
    }
  }
}
