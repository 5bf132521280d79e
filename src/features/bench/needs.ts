import type { Entry, EntrySummary } from '../../../server/contract/entries.ts'
import type { IconName } from '../../ui/icon.tsx'

/** Something that waits for the person, with the act that deals with it. */
export interface Need {
  key: string
  icon: IconName
  title: string
  detail: string
  /** Since when it waits. */
  since: string
  act: string
  entryId: string
  /** Where the act is done: on the sheet, or in the review. */
  place: 'sheet' | 'review'
}

type Waiting = EntrySummary & { notebookTitle: string }

/** What waits for a person, the returned first: nobody else can go on with those. */
export function needsOf(own: Entry[], waiting: Waiting[], personId: string): Need[] {
  const mine = own.filter((entry) => entry.authors.some((author) => author.personId === personId))
  return [
    ...mine.flatMap((entry) => returned(entry)),
    ...waiting.map((entry) => toWitness(entry)),
    ...mine.flatMap((entry) => outOfDate(entry)),
    ...mine.flatMap((entry) => toSign(entry, personId)),
  ]
}

function returned(entry: Entry): Need[] {
  if (entry.phase !== 'returned' || !entry.returned) return []
  const { by, reason, at } = entry.returned
  return [
    {
      key: `returned-${entry.id}`,
      icon: 'remark',
      title: `Answer ${by} on sheet ${entry.number}`,
      detail: `“${reason}” Returned to you unsigned.`,
      since: at,
      act: 'Open the sheet',
      entryId: entry.id,
      place: 'sheet',
    },
  ]
}

function toWitness(entry: Waiting): Need {
  const authors = entry.authors.map((author) => author.name).join(' and ')
  return {
    key: `witness-${entry.id}`,
    icon: 'eye',
    title: `Read and countersign sheet ${entry.number}`,
    detail: `${entry.title}, signed by ${authors}.`,
    since: entry.submittedAt ?? entry.updatedAt,
    act: 'Read as witness',
    entryId: entry.id,
    place: 'review',
  }
}

function outOfDate(entry: Entry): Need[] {
  if (!entry.allowed.includes('edit')) return []
  return newest(entry)
    .filter((calculation) => calculation.stale || calculation.status === 'failed')
    .map((calculation) => ({
      key: `calculation-${calculation.id}`,
      icon: 'trace' as const,
      title: calculation.stale
        ? `Recompute ${calculation.label} on sheet ${entry.number}`
        : `${calculation.label} failed on sheet ${entry.number}`,
      detail: calculation.stale
        ? 'An input changed, so its figures are out of date.'
        : 'The block says what is wrong and what to do.',
      since: entry.updatedAt,
      act: 'Open the sheet',
      entryId: entry.id,
      place: 'sheet' as const,
    }))
}

/** Of each label the last: it took the place of those before. */
function newest(entry: Entry): Entry['calculations'] {
  return [...new Map(entry.calculations.map((calculation) => [calculation.label, calculation])).values()]
}

function toSign(entry: Entry, personId: string): Need[] {
  const signed = entry.authors.some((author) => author.personId === personId && author.signed)
  const collecting = entry.phase === 'collecting' && !signed
  const ready = entry.phase === 'writing' && entry.blocks.length === 0 && entry.calculations.length > 0
  if (!entry.allowed.includes('sign:authorship') || !(collecting || ready)) return []
  const count = newest(entry).length
  return [
    {
      key: `sign-${entry.id}`,
      icon: 'pen',
      title: `Sign sheet ${entry.number}`,
      detail: collecting
        ? `${entry.title}. Another author has signed and waits for you.`
        : `${entry.title}. Text and ${count === 1 ? 'one calculation' : `${count} calculations`} complete.`,
      since: entry.updatedAt,
      act: 'Read and sign',
      entryId: entry.id,
      place: 'sheet',
    },
  ]
}
