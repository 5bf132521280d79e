import { Node } from '@tiptap/pm/model'
import { DocumentError } from './document-error.ts'
import { documentSchema, type DocumentNode, type NormalDocument } from './document.ts'
import { nodesWithId } from './extensions.ts'
import { inspect } from './inspect.ts'

/**
 * Checks a document from outside and brings it into the one form that is kept and signed: the schema's own JSON.
 * Missing and repeated ids are filled from `newId`; anything the schema does not admit is refused.
 * @throws {DocumentError}
 */
export function checkDocument(json: unknown, newId: () => string): NormalDocument {
  inspect(json)
  const document = asSchemaJson(json)
  completeIds(document, new Set(), newId)
  return document
}

function asSchemaJson(json: unknown): NormalDocument {
  let node: Node
  try {
    node = Node.fromJSON(documentSchema, withoutNulls(json))
    node.check()
  } catch (error) {
    throw new DocumentError('', `The parts of the text do not fit together: ${(error as Error).message}.`)
  }
  if (node.type !== documentSchema.topNodeType)
    throw new DocumentError('/type', 'A document is expected here.')
  // Attribute objects of the schema have no prototype; a round trip gives plain ones.
  return JSON.parse(JSON.stringify(node.toJSON())) as NormalDocument
}

/** The schema reads `attrs: undefined` as absent but not `attrs: null`. */
function withoutNulls(json: unknown): DocumentNode {
  return JSON.parse(JSON.stringify(json), (key, value) =>
    key === 'attrs' && value === null ? undefined : value,
  ) as DocumentNode
}

const withId = new Set(nodesWithId)

function completeIds(node: DocumentNode, taken: Set<unknown>, newId: () => string): void {
  if (withId.has(node.type)) {
    const attrs = (node.attrs ??= {})
    if (typeof attrs.id !== 'string' || taken.has(attrs.id)) attrs.id = freshId(taken, newId)
    taken.add(attrs.id)
  }
  for (const child of node.content ?? []) completeIds(child, taken, newId)
}

function freshId(taken: Set<unknown>, newId: () => string): string {
  for (let attempt = 0; attempt < 100; attempt++) {
    const id = newId()
    if (!taken.has(id)) return id
  }
  throw new Error('newId gives the same ids again and again')
}
