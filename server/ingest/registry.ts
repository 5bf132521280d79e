import type { z } from 'zod'
import { Problem } from '../contract/problems.ts'
import { detectDelimited } from './formats/delimited/detect.ts'
import { delimitedOptions } from './formats/delimited/options.ts'
import { DelimitedParser } from './formats/delimited/parse.ts'
import { OtherParser, otherOptions } from './formats/other.ts'
import type { DetectedReading, Parser } from './reading.ts'
import { notText } from './text.ts'

interface Format {
  name: string
  version: number
  title: string
  optionsSchema: z.ZodType<Record<string, unknown>>
  parser(options: Record<string, unknown>): Parser
}

/** The formats that can be read. A version changes when the same options would give another reading of the same bytes. */
export const formats: Format[] = [
  {
    name: 'delimited',
    version: 1,
    title: 'Delimited text',
    optionsSchema: delimitedOptions,
    parser: (options) => new DelimitedParser(delimitedOptions.parse(options)),
  },
  {
    name: 'other',
    version: 1,
    title: 'Kept as it is',
    optionsSchema: otherOptions,
    parser: () => new OtherParser(),
  },
]

function formatOf(name: string): Format {
  const format = formats.find((f) => f.name === name)
  if (format) return format
  const known = formats.map((f) => f.name).join(', ')
  throw new Problem('invalid-values', `There is no format ${name}; the formats are ${known}.`, {
    errors: [{ pointer: '/format', detail: `one of ${known}` }],
  })
}

/** The version in use of a format. Throws Problem (invalid-values) when there is no such format. */
export function formatVersion(name: string): number {
  return formatOf(name).version
}

/** Checks the options of a format, as they are then kept. Throws Problem (invalid-values) that names each wrong one. */
export function readingOptions(name: string, options: Record<string, unknown>): Record<string, unknown> {
  const parsed = formatOf(name).optionsSchema.safeParse(options)
  if (parsed.success) return parsed.data
  const errors = parsed.error.issues.map((issue) => ({
    pointer: `/options/${issue.path.join('/')}`.replace(/\/$/, ''),
    detail: issue.message,
  }))
  throw new Problem(
    'invalid-values',
    `These options do not fit the format ${name}: ${errors.map((e) => e.detail).join(' ')}`,
    { errors },
  )
}

/**
 * How to read a file, from its first 64 KiB (all of a smaller one) and its name. `confident` is false when something was
 * guessed that the file does not say; `unreadable` says what is missing.
 */
export function detectReading(head: Uint8Array, fileName: string): DetectedReading | { unreadable: string } {
  if (head.length === 0) return { unreadable: `${fileName} is empty.` }
  const detected = notText(head) === null ? detectDelimited(head) : null
  if (detected === null)
    return { format: 'other', version: formatVersion('other'), options: {}, confident: true, doubt: null }
  if ('unreadable' in detected) return detected
  const { options, doubts } = detected
  const doubt = doubts.length === 0 ? null : `${doubts.join(' ')} Check the reading.`
  return {
    format: 'delimited',
    version: formatVersion('delimited'),
    options,
    confident: doubt === null,
    doubt,
  }
}

/**
 * A parser for a file in that format. Throws Problem (invalid-values) for an unknown format, version or wrong options.
 */
export function createParser(name: string, version: number, options: Record<string, unknown>): Parser {
  const format = formatOf(name)
  if (version !== format.version) {
    throw new Problem(
      'invalid-values',
      `Version ${version} of the format ${name} is not known; version ${format.version} is.`,
    )
  }
  return format.parser(readingOptions(name, options))
}
