import { labelNumber } from '../record-order.ts'
import { contributions, type RecordCalculation } from '../record-body.ts'
import type { SignedRecord } from '../record.ts'
import { placedCalculations, quotesIn, readingSha256 } from '../content.ts'
import type { Case } from './case.ts'
import { isInOrder, isUnique } from './in-order.ts'
import { need, present, Wrong } from './report.ts'

/** Lists of the body stand in the order of shapes 1 ("Order"), and nothing stands twice. */
export function checkOrder(record: SignedRecord): void {
  need(
    isInOrder(record.runs, (run) => labelNumber(run.number)),
    'runs are not in order',
  )
  need(
    isInOrder(record.calculations, (item) => labelNumber(item.label)),
    'calculations are not in order',
  )
  need(
    isInOrder(
      record.files,
      (file) => file.uploadedAt,
      (file) => file.id,
    ),
    'files are not in order',
  )
  for (const [what, people] of [
    ['authors', record.authors],
    ['contributors', record.contributors],
  ] as const) {
    const ids = (people as readonly { subjectId: string }[]).map((person) => person.subjectId)
    need(isInOrder(ids, (id) => id) && isUnique(ids, (id) => id), `${what} are not in order, or twice`)
  }
  for (const { revisions } of record.authors) {
    const fine = revisions.length > 0 && isInOrder(revisions, (n) => n) && isUnique(revisions, (n) => n)
    need(fine, 'revisions of an author are not in order, or none')
  }
  for (const { acts } of record.contributors) {
    const due = contributions.filter((act) => acts.includes(act))
    need(acts.length > 0 && acts.join() === due.join(), 'acts are not in order, or none')
  }
  for (const run of record.runs) {
    need(
      isInOrder(
        run.cautions,
        (item) => item.time,
        (item) => item.code,
      ),
      'cautions are not in order',
    )
  }
  const { returns, voided } = record.history
  const inOrder = isInOrder(
    returns,
    (item) => item.time,
    (item) => item.bySubjectId,
  )
  need(
    inOrder &&
      isInOrder(
        voided,
        (item) => item.time,
        (item) => item.recordSha256,
      ),
    'history is not in order',
  )
  checkUnique(record)
  const { writtenFrom, writtenTo } = record.entry
  need(
    writtenFrom === null || writtenTo === null || writtenFrom <= writtenTo,
    'writtenFrom is after writtenTo',
  )
}

function checkUnique(record: SignedRecord): void {
  need(
    isUnique(record.runs, (run) => run.id) && isUnique(record.runs, (run) => run.number),
    'a run stands twice',
  )
  need(
    isUnique(record.files, (file) => file.id),
    'a file stands twice',
  )
  const calculations = record.calculations
  need(
    isUnique(calculations, (item) => item.id) && isUnique(calculations, (item) => item.label),
    'a calculation stands twice',
  )
  need(
    isUnique(record.quotes, (quote) => quote.nodeId),
    'a quote stands twice',
  )
}

/** Files of the entry and its runs; quotes of the content; calculations placed or quoted and, in turn, their inputs. */
export function checkReferences(c: Case, record: SignedRecord): void {
  const runs = new Set(record.runs.map((run) => run.id))
  const acts = new Map(record.contributors.map((person) => [person.subjectId, person.acts]))
  for (const file of record.files) {
    need(file.runId === null || runs.has(file.runId), `file of an unknown run: ${file.name}`)
    need(acts.get(file.uploadedBy)?.includes('file') === true, `who uploaded is no contributor: ${file.name}`)
    need(
      !file.reading || readingSha256(file.reading) === file.reading.sha256,
      'digest of a reading does not recompute',
    )
  }
  const quoted = quotesIn(record.content)
  const named = record.quotes.map(({ nodeId, calculationId, pointer }) => ({
    nodeId,
    calculationId,
    pointer,
  }))
  need(JSON.stringify(quoted) === JSON.stringify(named), 'quotes are not those of the content, in order')
  checkReached(record, [...quoted.map((quote) => quote.calculationId), ...placedCalculations(record.content)])
  for (const calculation of record.calculations) {
    for (const input of calculation.inputs) checkInput(c, record, calculation, input)
  }
}

function checkReached(record: SignedRecord, placed: readonly string[]): void {
  const known = new Map(record.calculations.map((calculation) => [calculation.id, calculation]))
  const reached = new Set<string>()
  const todo = [...placed]
  for (let id = todo.pop(); id !== undefined; id = todo.pop()) {
    if (reached.has(id)) continue
    reached.add(id)
    const { inputs } = present(known.get(id), 'a calculation of the content is not in the record')
    for (const input of inputs)
      if ('calculationId' in input && !input.homeEntry) todo.push(input.calculationId)
  }
  need(reached.size === known.size, 'calculations are not those placed or quoted and their inputs')
}

function checkInput(
  c: Case,
  own: SignedRecord,
  calculation: RecordCalculation,
  input: RecordCalculation['inputs'][number],
): void {
  const source = sourceOf(c, own, calculation, input.homeEntry)
  if (!source) return
  if ('fileId' in input) {
    const file = source.files.find((candidate) => candidate.id === input.fileId)
    const same = file?.sha256 === input.sha256 && file.reading?.sha256 === input.readingSha256
    need(same, `input of ${calculation.label} is not the file or its reading`)
  } else {
    const other = source.calculations.find((candidate) => candidate.id === input.calculationId)
    need(other?.resultSha256 === input.resultSha256, `input of ${calculation.label} is another result`)
  }
}

/** The record that an input belongs to; null, with a remark, when its entry is not in this bundle. */
function sourceOf(
  c: Case,
  own: SignedRecord,
  calculation: RecordCalculation,
  home: { entryId: string; number: string } | null,
): SignedRecord | null {
  if (!home) return own
  need(home.entryId !== own.entry.id, 'an input of this entry is said to be another’s')
  const other = c.entries.get(home.entryId)
  if (!other) {
    const number = c.leftOutNumbers().get(home.entryId) ?? home.number
    need(number === home.number, 'home entry has another number in leftOut')
    c.report.remark('input', calculation.label, `from ${home.number}, not in this bundle`)
    return null
  }
  need(other.number === home.number, 'home entry has another number')
  if (!other.record) throw new Wrong('the record of the home entry could not be read')
  return other.record
}
