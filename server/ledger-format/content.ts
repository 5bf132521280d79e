import { canonicalBytes, type Json } from './canonical-json.ts'
import { sha256Hex } from './digest.ts'

/** A node of the rich text, as far as the record reads it. */
export interface ContentNode {
  type?: Json
  attrs?: { [member: string]: Json }
  content?: ContentNode[]
}

/** SHA-256 (hex) of the JCS of an entry's content. */
export function contentSha256(content: unknown): string {
  return sha256Hex(canonicalBytes(content))
}

/** SHA-256 (hex) of the JCS of `{ format, version, options }`: names a way of reading a file. */
export function readingSha256(reading: { format: string; version: number; options: unknown }): string {
  const { format, version, options } = reading
  return sha256Hex(canonicalBytes({ format, version, options }))
}

/** The nodes of a document in document order, itself first. */
export function* walkContent(node: ContentNode): Generator<ContentNode> {
  yield node
  for (const child of node.content ?? []) yield* walkContent(child)
}

/** Quoted results of a document, in document order. */
export function quotesIn(content: unknown): { nodeId: string; calculationId: string; pointer: string }[] {
  return [...walkContent(content as ContentNode)]
    .filter((node) => node.type === 'quotedResult')
    .map((node) => ({
      nodeId: textAttribute(node, 'id'),
      calculationId: textAttribute(node, 'calculationId'),
      pointer: textAttribute(node, 'pointer'),
    }))
}

/** Ids of the calculations placed as blocks in a document, in document order. */
export function placedCalculations(content: unknown): string[] {
  return [...walkContent(content as ContentNode)]
    .filter((node) => node.type === 'calculation')
    .map((node) => textAttribute(node, 'calculationId'))
}

function textAttribute(node: ContentNode, name: string): string {
  const value = node.attrs?.[name]
  if (typeof value !== 'string')
    throw new Error(`A ${String(node.type)} node of the content lacks its ${name}.`)
  return value
}
