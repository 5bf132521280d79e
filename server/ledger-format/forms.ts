import { z } from 'zod'
import { fromBase64 } from './digest.ts'
import type { Json } from './canonical-json.ts'

/*
 * Forms shared by all documents of the ledger (shapes "Common"). They refuse more than the forms of the HTTP interface:
 * what is signed has exactly one spelling.
 */

export const hexForm = z.string().regex(/^[0-9a-f]{64}$/, 'not 64 lower-case hex digits')
export const idForm = z.string().regex(/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/, 'not a lower-case UUID')
export const entryNumberForm = z.string().regex(/^N-\d+\/\d+$/, 'not an entry number such as N-07/042')
export const textForm = z.string().min(1)
export const decimalForm = z
  .string()
  .regex(/^-?(0|[1-9]\d*)(\.\d+)?(e-?[1-9]\d*)?$/, 'not a decimal number as text')
export const integerTextForm = z.string().regex(/^(0|[1-9]\d*)$/, 'not a whole number as text')
export const countForm = z.int().min(1)
export const schemaName = <Name extends string>(name: Name) => z.literal(`halfsilver-${name}` as const)

/** UTC with milliseconds, a time that exists: 2026-03-02T09:15:00.000Z. */
export const timeForm = z.string().refine(isTime, 'not a time such as 2026-03-02T09:15:00.000Z')

function isTime(text: string): boolean {
  if (!/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/.test(text)) return false
  const time = new Date(text)
  return !Number.isNaN(time.getTime()) && time.toISOString() === text
}

/** Base64 of exactly so many bytes. */
export function base64Form(size: number) {
  return z.string().refine((text) => base64Size(text) === size, `not base64 of ${size} bytes`)
}

function base64Size(text: string): number {
  try {
    return fromBase64(text).length
  } catch {
    return -1
  }
}

/** An object of free content; numbers finite, integers below 2^53 in magnitude. */
export const freeForm = z.custom<{ [member: string]: Json }>(
  (value) => typeof value === 'object' && value !== null && !Array.isArray(value) && numbersFit(value),
  'not an object whose integers lie below 2^53',
)

function numbersFit(value: unknown): boolean {
  if (typeof value === 'number')
    return Number.isFinite(value) && (!Number.isInteger(value) || Number.isSafeInteger(value))
  return typeof value !== 'object' || value === null || Object.values(value).every(numbersFit)
}

/** Throws one sentence that names the first member that does not fit. */
export function checkForm<T extends z.ZodType>(form: T, value: unknown): asserts value is z.output<T> {
  const result = form.safeParse(value)
  if (!result.success) throw new Error(firstIssue(result.error))
}

function firstIssue(error: z.ZodError): string {
  const issue = error.issues[0]
  return `/${issue?.path.join('/') ?? ''}: ${issue?.message ?? 'does not fit'}`
}
