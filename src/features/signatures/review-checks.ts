import type { Calculation } from '../../../server/contract/calculations.ts'
import type { Entry } from '../../../server/contract/entries.ts'
import type { StateName } from '../../ui/state-glyph.tsx'
import { filesToSign } from './entry-files.ts'

export interface Check {
  state: Extract<StateName, 'ok' | 'note' | 'fault'>
  what: string
  more?: string
}

/**
 * What the program knows of a submitted sheet, told to the witness: who signed, whether the files are compared with the
 * store, whether the calculations are up to date, and every quality note. `calculations` are those read in full so far.
 */
export function checksOf(entry: Entry, calculations: readonly Calculation[]): Check[] {
  return [
    ...signatureChecks(entry),
    ...fileChecks(entry),
    ...calculationChecks(entry),
    ...noteChecks(calculations),
  ]
}

function signatureChecks(entry: Entry): Check[] {
  const signed = entry.signatures.filter((each) => each.meaning === 'authorship' && !each.voided)
  if (signed.length === 0) return [{ state: 'note', what: 'No author’s signature stands' }]
  const stamped = signed.filter((each) => each.timeStamp.status === 'stamped')
  const check: Check[] = [
    {
      state: entry.authors.every((author) => author.signed) ? 'ok' : 'note',
      what: signed.length === 1 ? 'The author has signed' : `${signed.length} authors have signed`,
      more: signed.map((each) => each.signer.name).join(', '),
    },
  ]
  if (stamped.length < signed.length)
    check.push({ state: 'note', what: 'A time stamp is still to come', more: 'It joins by itself.' })
  return check
}

function fileChecks(entry: Entry): Check[] {
  const files = filesToSign(entry)
  const bad = files.filter((file) => file.state !== 'verified')
  if (files.length === 0) return [{ state: 'note', what: 'No file is attached' }]
  if (bad.length === 0)
    return [
      {
        state: 'ok',
        what:
          files.length === 1 ? 'The file matches its digest' : `${files.length} files match their digests`,
      },
    ]
  return bad.map((file) => ({
    state: file.state === 'stored' || file.state === 'receiving' ? 'note' : 'fault',
    what: `${file.name}: ${fileWords[file.state]}`,
  }))
}

const fileWords: Record<Entry['files'][number]['state'], string> = {
  receiving: 'still being received',
  stored: 'not yet compared with the store’s copy',
  verified: 'matches its digest',
  mismatch: 'the store’s copy does not match its digest',
  missing: 'not in the store',
}

function calculationChecks({ calculations }: Entry): Check[] {
  const wrong = calculations.filter((each) => each.status !== 'done' || each.stale)
  if (calculations.length === 0) return [{ state: 'note', what: 'No calculation' }]
  if (wrong.length === 0) {
    const labels = calculations.map((each) => each.label).join(', ')
    return [{ state: 'ok', what: `${labels} up to date with their inputs` }]
  }
  return wrong.map((each) => ({
    state: 'fault',
    what: `${each.label} is ${each.stale ? 'out of date' : each.status}`,
  }))
}

function noteChecks(calculations: readonly Calculation[]): Check[] {
  return calculations.flatMap((each) =>
    each.notes.map((note): Check => ({
      state: 'note',
      what: `${each.label}: ${note.detail || note.code}`,
      more: note.code,
    })),
  )
}

/** What a witness is to open, from the entry itself; the server lists what was opened from the witness's own requests. */
export interface Openable {
  kind: 'text' | 'calculation' | 'file'
  id: string
  name: string
}

export function openablesOf(entry: Entry): Openable[] {
  return [
    { kind: 'text', id: entry.id, name: 'The text' },
    ...entry.calculations.map((each) => ({ kind: 'calculation' as const, id: each.id, name: each.label })),
    ...filesToSign(entry).map((file) => ({ kind: 'file' as const, id: file.id, name: file.name })),
  ]
}

/** The four questions of a witness. The screen insists on them; the record holds only what was opened and the meaning. */
export const questions = [
  { code: 'repeat', text: 'Another person could repeat this from the text' },
  { code: 'raw', text: 'Raw runs are attached and named' },
  { code: 'corrections', text: 'Corrections are stated: dark counts, dead time, accidentals' },
  { code: 'conclusion', text: 'The conclusion follows from the figures' },
] as const
export type QuestionCode = (typeof questions)[number]['code']

/** Why countersigning is not yet offered, or null. */
export function stillToDo(unopened: readonly Openable[], unanswered: number): string | null {
  const parts: string[] = []
  if (unopened.length > 0)
    parts.push(`open ${unopened.map((each) => (each.kind === 'text' ? 'the text' : each.name)).join(', ')}`)
  if (unanswered > 0)
    parts.push(unanswered === 1 ? 'answer the last question' : `answer the ${unanswered} questions`)
  return parts.length === 0 ? null : `Still to do: ${parts.join('; ')}.`
}
