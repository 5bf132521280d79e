import type { Figure } from '../../contract/figure.ts'
import type { EntrySignature } from '../../contract/signatures.ts'
import type { RecordBody } from '../../ledger-format/record-body.ts'

/** A calculation of a sealed sheet with what is drawn of it. */
export interface SheetCalculation {
  id: string
  label: string
  title: string
  /** Each parameter with the words that the kind gives it. */
  parameters: string
  result: Buffer
  figure: Figure | null
  svg: string | null
  csv: string | null
}

/** Everything a print of a sealed entry shows; all of it was signed or stands in the ledger. */
export interface SheetInput {
  body: RecordBody
  bodySha256: string
  zone: string
  signatures: EntrySignature[]
  seal: { sequence: number; digest: string; time: string }
  calculations: SheetCalculation[]
  /** Pictures in the text as data URLs, by file id. */
  images: Map<string, string>
  names: Map<string, string>
}
