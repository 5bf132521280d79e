import type { z } from 'zod'
import type { blockSchema } from '../../contract/entries.ts'
import { calculationsIn, filesIn, plainText } from '../../document/index.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { isStale, type CalculationRow } from '../calculations/index.ts'
import { dateInZone, writtenBetween, type EntryRow } from '../entries/index.ts'
import { gather, type Gathered } from './gather.ts'
import { quotesWithValues } from './quotes.ts'

export type Block = z.infer<typeof blockSchema>

const DAY_MS = 86_400_000

/** What stands in the way of signing an entry, each with a sentence; empty when it can be signed. */
export async function signingBlocks(services: Services, entry: EntryRow, t?: Transaction): Promise<Block[]> {
  return blocksOf(services, await gather(services, entry, t), t)
}

export async function blocksOf(services: Services, gathered: Gathered, t?: Transaction): Promise<Block[]> {
  return [
    ...writingBlocks(gathered),
    ...(await lateBlocks(services, gathered, t)),
    ...gathered.files.flatMap(fileBlocks),
    ...calculationBlocks(gathered),
    ...(await quoteBlocks(services, gathered, t)),
  ]
}

const block = (code: string, detail: string, pointer: string | null = null): Block => ({
  code,
  detail,
  pointer,
})

function writingBlocks({ entry, document }: Gathered): Block[] {
  const empty =
    plainText(document).trim() === '' &&
    calculationsIn(document).length === 0 &&
    filesIn(document).length === 0
  return entry.saveNumber === 0 || empty
    ? [block('nothing-written', 'Nothing has been written in this entry.')]
    : []
}

/** Writing more than a day away from the work asks for a remark that says why. */
async function lateBlocks(services: Services, { entry }: Gathered, t?: Transaction): Promise<Block[]> {
  const written = await writtenBetween(services.db, entry.id, t)
  if (!written || entry.lateRemark !== null) return []
  const writingDate = dateInZone(written.first, services.config.laboratory.zone)
  const apart = Math.abs(Date.parse(writingDate) - Date.parse(entry.workDate)) / DAY_MS
  if (apart <= 1) return []
  return [
    block(
      'late-remark-missing',
      `The work date is ${entry.workDate}, the writing began on ${writingDate}. Say in a remark why they lie more than a day apart.`,
      '/lateRemark',
    ),
  ]
}

function fileBlocks({ id, name, state, readingStatus, readingBy }: Gathered['files'][number]): Block[] {
  const at = `/files/${id}`
  const blocks: Block[] = []
  if (state === 'stored')
    blocks.push(
      block(
        'file-not-verified',
        `${name} is still being compared with the store's copy. Wait for it to end.`,
        at,
      ),
    )
  if (state === 'mismatch' || state === 'missing')
    blocks.push(
      block(
        'file-damaged',
        `The store no longer holds ${name} as it was uploaded. Tell the manager; the entry cannot be signed like this.`,
        at,
      ),
    )
  if (readingStatus === 'pending')
    blocks.push(block('file-being-read', `${name} is still being read. Wait for it to end.`, at))
  if (readingStatus === 'unreadable' && readingBy !== null)
    blocks.push(
      block(
        'reading-does-not-fit',
        `${name} cannot be read in the way that was chosen. Choose another way to read it.`,
        at,
      ),
    )
  return blocks
}

const unfinished: Partial<Record<CalculationRow['status'], [code: string, words: string]>> = {
  queued: ['calculation-queued', 'waits in the queue'],
  running: ['calculation-queued', 'is still running'],
  failed: ['calculation-failed', 'failed; compute it again or take it out of the text'],
  cancelled: ['calculation-failed', 'was cancelled; compute it again or take it out of the text'],
}

function calculationBlocks(gathered: Gathered): Block[] {
  const { used, unknown, inputs, homes, entry } = gathered
  const blocks = unknown.map((id) =>
    block(
      'calculation-unknown',
      'The text names a calculation that this entry does not have. Take it out of the text.',
      `/calculations/${id}`,
    ),
  )
  for (const calculation of used) {
    const at = `/calculations/${calculation.id}`
    const label = `C${calculation.label}`
    const state = unfinished[calculation.status]
    if (state) blocks.push(block(state[0], `${label} ${state[1]}.`, at))
    if (isStale(calculation, inputs))
      blocks.push(
        block(
          'calculation-stale',
          `${label} was computed from another reading of its file. Compute it again.`,
          at,
        ),
      )
    for (const { fileId } of calculation.inputs) {
      const homeId = inputs.get(fileId)?.homeEntryId ?? null
      if (homeId !== entry.id && homes.get(homeId ?? '')?.state !== 'sealed')
        blocks.push(
          block(
            'source-not-sealed',
            `${label} takes a file of an entry that is not sealed. That entry must be sealed first.`,
            at,
          ),
        )
    }
  }
  return [...blocks, ...doubleLabels(used)]
}

/** A label names one calculation of the signed entry; a block and its successor cannot both stand in the text. */
function doubleLabels(used: readonly CalculationRow[]): Block[] {
  const labels = used.map(({ label }) => label)
  return [...new Set(labels.filter((label, at) => labels.indexOf(label) !== at))].map((label) =>
    block(
      'label-twice',
      `The text uses two calculations named C${label}. Keep the newer one, in the block and in the quoted results.`,
    ),
  )
}

async function quoteBlocks(services: Services, gathered: Gathered, t?: Transaction): Promise<Block[]> {
  const quotes = await quotesWithValues(services, gathered, t)
  return quotes
    .filter(({ shown, finished }) => finished && shown === null)
    .map(({ pointer, label }) =>
      block(
        'quote-without-value',
        `A quoted result names ${pointer} of ${label}, which has no value. Choose another figure.`,
        pointer,
      ),
    )
}
