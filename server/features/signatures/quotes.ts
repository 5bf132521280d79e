import { shownText } from '../../contract/quantity-text.ts'
import { quotesIn } from '../../document/index.ts'
import { figureAt } from '../../physics/figures.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { resultBytes } from '../calculations/index.ts'
import type { Gathered } from './gather.ts'

export interface QuoteWithValue {
  nodeId: string
  calculationId: string
  pointer: string
  /** C2; empty when the entry has no such calculation. */
  label: string
  finished: boolean
  /** The typographic text, without unit; null when the result has no value there. */
  shown: string | null
}

/** Quoted results of the text in document order, each with the text that a reader sees. */
export async function quotesWithValues(
  services: Pick<Services, 'db'>,
  gathered: Pick<Gathered, 'document' | 'used'>,
  t?: Transaction,
): Promise<QuoteWithValue[]> {
  const results = new Map<string, unknown>()
  const quotes: QuoteWithValue[] = []
  for (const quote of quotesIn(gathered.document)) {
    const calculation = gathered.used.find(({ id }) => id === quote.calculationId)
    const sha256 = calculation?.status === 'done' ? calculation.resultSha256 : null
    if (sha256 && !results.has(sha256))
      results.set(sha256, JSON.parse((await resultBytes(services.db, sha256, t)).toString('utf8')))
    const figure = sha256 ? figureAt(results.get(sha256), quote.pointer) : null
    quotes.push({
      ...quote,
      label: calculation ? `C${calculation.label}` : '',
      finished: sha256 !== null,
      shown: figure && shownText(figure.value, figure.u),
    })
  }
  return quotes
}
