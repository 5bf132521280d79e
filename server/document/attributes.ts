import { z } from 'zod'
import { isAllowedHref } from './allowed-href.ts'

const id = z
  .string()
  .regex(/^[A-Za-z0-9_-]{1,64}$/, 'is not an id')
  .nullish()
const uuid = z.uuid()
const span = z.number().int().min(1).max(100).optional()
const cell = {
  id,
  colspan: span,
  rowspan: span,
  colwidth: z.array(z.number().int().min(0).max(10_000)).max(100).nullish(),
  align: z.enum(['left', 'center', 'right']).nullish(),
}
const latex = z.string().max(10_000)
const block = z.strictObject({ id })

/** Attributes a node may have. What the table does not name is refused, so that nothing unread is ever signed. */
export const nodeAttributes: Record<string, z.ZodType> = {
  doc: z.strictObject({}),
  text: z.strictObject({}),
  hardBreak: z.strictObject({}),
  paragraph: block,
  heading: z.strictObject({ id, level: z.number().int().min(1).max(3).optional() }),
  bulletList: block,
  orderedList: z.strictObject({
    id,
    start: z.number().int().min(0).max(1_000_000).optional(),
    type: z.enum(['1', 'a', 'A', 'i', 'I']).nullish(),
  }),
  listItem: block,
  blockquote: block,
  codeBlock: z.strictObject({
    id,
    language: z
      .string()
      .regex(/^[A-Za-z0-9+#-]{1,40}$/)
      .nullish(),
  }),
  horizontalRule: block,
  table: block,
  tableRow: block,
  tableHeader: z.strictObject(cell),
  tableCell: z.strictObject(cell),
  image: z.strictObject({
    id,
    fileId: uuid,
    alt: z.string().max(2000).optional(),
    caption: z.string().max(2000).optional(),
    width: z.number().int().min(40).max(2000).nullish(),
  }),
  mathInline: z.strictObject({ latex }),
  mathBlock: z.strictObject({ id, latex }),
  calculation: z.strictObject({ id, calculationId: uuid }),
  quotedResult: z.strictObject({
    id,
    calculationId: uuid,
    pointer: z
      .string()
      .max(300)
      .regex(/^(\/([^~/]|~[01])*)+$/, 'is not a JSON pointer'),
  }),
}

const none = z.strictObject({})

/** Attributes a mark may have. */
export const markAttributes: Record<string, z.ZodType> = {
  bold: none,
  italic: none,
  underline: none,
  strike: none,
  code: none,
  subscript: none,
  superscript: none,
  link: z.strictObject({
    href: z
      .string()
      .refine(
        isAllowedHref,
        'is not an address we link to: http, https, mailto or an entry of this laboratory',
      ),
  }),
}
