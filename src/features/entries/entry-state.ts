import type { EntrySummary } from '../../../server/contract/entries.ts'
import type { StateName } from '../../ui/state-glyph.tsx'

const glyphs: Record<EntrySummary['phase'], StateName> = {
  writing: 'draft',
  collecting: 'signed',
  returned: 'returned',
  'with-witness': 'with-witness',
  sealed: 'sealed',
  withdrawn: 'withdrawn',
}

/** The glyph of an entry's phase. */
export const glyphOf = (phase: EntrySummary['phase']): StateName => glyphs[phase]

/** 042 of N-07/042. */
export const sheetNumber = (number: string): string => number.split('/')[1] ?? number

/** Maren Adeyemi, with Teo Laukkanen. */
export function authorsInWords(authors: { name: string }[]): string {
  const [first, ...others] = authors.map((author) => author.name)
  if (first === undefined) return 'Nobody has written yet'
  return others.length === 0 ? first : `${first}, with ${others.join(' and ')}`
}
