import { figureText, shownText } from '../../contract/quantity-text.ts'
import { resultFiles } from '../bundle/layout.ts'
import { parseJson, type Json } from '../canonical-json.ts'
import { sha256Hex } from '../digest.ts'
import type { RecordCalculation } from '../record-body.ts'
import type { SignedRecord } from '../record.ts'
import type { Case } from './case.ts'
import { sameSet } from './in-order.ts'
import { atPointer } from './json-pointer.ts'
import { listedFigures } from './listed-figures.ts'
import { need } from './report.ts'

/** calculations/: a folder for each calculation of the record; digests, figures and quotes against result.json. */
export function checkResults(c: Case, folder: string, record: SignedRecord): void {
  const base = `${folder}calculations/`
  c.report.check('result folders', base, () => {
    const labels = record.calculations.map((calculation) => calculation.label)
    need(sameSet(c.folders(base), labels), 'folders are not those of the record’s calculations')
  })
  for (const calculation of record.calculations) {
    const path = `${base}${calculation.label}/${resultFiles[0]}`
    for (const name of resultFiles) c.call(`${base}${calculation.label}/${name}`)
    c.report.check('result digest', path, () => {
      need(sha256Hex(c.read(path)) === calculation.resultSha256, 'not the result that the record names')
    })
    c.report.check('figures', path, () => checkFigures(parseJson(c.read(path)), calculation))
    c.report.check('quotes', path, () => {
      const quotes = record.quotes.filter((quote) => quote.calculationId === calculation.id)
      if (quotes.length === 0) return
      const result = parseJson(c.read(path))
      for (const quote of quotes) {
        const { value, u } = quantityAt(result, quote.pointer)
        need(
          quote.shown === shownText(value, u),
          `${value} ± ${u} is shown as ${JSON.stringify(quote.shown)}`,
        )
      }
    })
  }
}

interface QuantityAt {
  value: number
  u: number | null
  unit: Json
}

/** A quantity `{ value, u, unit }` or a plain number at a pointer. */
function quantityAt(result: Json, pointer: string): QuantityAt {
  const found = atPointer(result, pointer)
  const isQuantity = typeof found === 'object' && found !== null && !Array.isArray(found)
  const value = isQuantity ? found.value : found
  const u = isQuantity ? (found.u ?? null) : null
  need(typeof value === 'number', `the result has no value at ${pointer}`)
  need(u === null || typeof u === 'number', `the result has no uncertainty at ${pointer}`)
  return { value, u, unit: isQuantity ? (found.unit ?? null) : null }
}

function checkFigures(result: Json, calculation: RecordCalculation): void {
  for (const figure of calculation.figures) {
    const { value, u, unit } = quantityAt(result, figure.pointer)
    const text = figureText(value, u)
    const same = figure.value === text.value && figure.u === text.u
    need(same, `${figure.pointer} is ${value} ± ${u}, not ${figure.value} ± ${figure.u}`)
    need(unit === null || unit === figure.unit, `unit at ${figure.pointer} is ${JSON.stringify(unit)}`)
  }
  const due = listedFigures(calculation.kind, result, calculation.parameters)
  if (due === null) return
  const have = calculation.figures.map((figure) => figure.pointer)
  // The model's own order of fitted parameters is not in the result.
  const ordered = (pointers: readonly string[]) =>
    pointers.filter((pointer) => !pointer.includes('/parameters/')).join('\n')
  need(
    ordered(due) === ordered(have) && sameSet(due, have),
    `figures listed are ${have.join(' ')}, not ${due.join(' ')}`,
  )
}
