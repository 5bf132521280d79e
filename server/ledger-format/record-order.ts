import { quotesIn } from './content.ts'
import { contributions, type RecordBody } from './record-body.ts'

type Parts = Omit<RecordBody, 'schema' | 'contentSha256'>

/** Number in a label: C10 -> 10, R-0612 -> 612. */
export function labelNumber(label: string): number {
  return Number(/\d+/.exec(label)?.[0] ?? Number.NaN)
}

/** Compares by the given keys in turn; texts by code unit, numbers as numbers. */
export function byKeys<T>(...keys: ((item: T) => string | number)[]): (a: T, b: T) => number {
  return (a, b) => {
    for (const key of keys) {
      const [x, y] = [key(a), key(b)]
      if (x !== y) return x < y ? -1 : 1
    }
    return 0
  }
}

/**
 * The same parts with every list in the order of shapes 1 ("Order"), so that the same state always gives the same bytes.
 * Conditions, apparatus, figures, notes and inputs stay as stored. @throws when a quote is not in the content.
 */
export function inRecordOrder(parts: Parts): Parts {
  return {
    ...parts,
    authors: parts.authors
      .map((author) => ({ ...author, revisions: [...author.revisions].sort((a, b) => a - b) }))
      .sort(byKeys((author) => author.subjectId)),
    contributors: parts.contributors
      .map((person) => ({ ...person, acts: contributions.filter((act) => person.acts.includes(act)) }))
      .sort(byKeys((person) => person.subjectId)),
    runs: parts.runs
      .map((run) => ({
        ...run,
        cautions: [...run.cautions].sort(
          byKeys(
            (c) => c.time,
            (c) => c.code,
          ),
        ),
      }))
      .sort(byKeys((run) => labelNumber(run.number))),
    files: [...parts.files].sort(
      byKeys(
        (file) => file.uploadedAt,
        (file) => file.id,
      ),
    ),
    calculations: [...parts.calculations].sort(byKeys((calculation) => labelNumber(calculation.label))),
    quotes: inDocumentOrder(parts),
    history: {
      returns: [...parts.history.returns].sort(
        byKeys(
          (item) => item.time,
          (item) => item.bySubjectId,
        ),
      ),
      voided: [...parts.history.voided].sort(
        byKeys(
          (item) => item.time,
          (item) => item.recordSha256,
        ),
      ),
    },
  }
}

function inDocumentOrder({ content, quotes }: Parts): Parts['quotes'] {
  const places = new Map(quotesIn(content).map((quote, place) => [quote.nodeId, place]))
  const stray = quotes.find((quote) => !places.has(quote.nodeId))
  if (stray) throw new Error(`The quote ${stray.nodeId} is not in the content.`)
  return [...quotes].sort(byKeys((quote) => places.get(quote.nodeId) ?? 0))
}
