import type { Entry } from '../../../server/contract/entries.ts'
import type { Meaning, SigningKey } from '../../../server/contract/signatures.ts'
import { canonicalBytes, parseCanonical } from '../../../server/ledger-format/canonical-json.ts'
import { contentSha256 } from '../../../server/ledger-format/content.ts'
import { sha256Hex } from '../../../server/ledger-format/digest.ts'
import { checkForm } from '../../../server/ledger-format/forms.ts'
import {
  bodyOf,
  recordForm,
  signingProblem,
  type SignedRecord,
} from '../../../server/ledger-format/record.ts'
import { signingStatement } from '../../../server/ledger-format/statements.ts'
import { filesToSign } from './entry-files.ts'

/** What the screen shows and the signer means to sign; the bytes from the server must say exactly this (shapes 5). */
export interface Expected {
  entry: Entry
  /** The rich text as it stands on the screen. */
  content: unknown
  laboratory: { id: string }
  meaning: Meaning
  signer: { id: string; name: string }
  key: Pick<SigningKey, 'certificate' | 'enrolmentSha256'>
  /** Only for witness-present; UTC. */
  presence?: { runId: string; from: string; to: string }
}

/** The bytes to sign do not say what the screen shows. Nothing was signed. */
export class RecordMismatch extends Error {
  constructor(detail: string) {
    super(
      `${detail} Nothing was signed. Close this, reload the sheet and read it again; if it stays so, tell the laboratory manager.`,
    )
    this.name = 'RecordMismatch'
  }
}

function demand(holds: boolean, detail: string): void {
  if (!holds) throw new RecordMismatch(detail)
}

/**
 * Checks the exact bytes that are to be signed and gives what they say. They must be canonical, of the form of a record,
 * and name the laboratory, entry, revision, meaning and signer of the screen, with its content, files and figures.
 * @throws {RecordMismatch} with the first thing that differs.
 */
export function checkRecord(bytes: Uint8Array, expected: Expected): SignedRecord {
  const record = parseRecord(bytes)
  checkParties(record, expected)
  checkEntry(record, expected)
  checkFiles(record, expected.entry)
  checkCalculations(record, expected.entry)
  checkStatement(record, expected)
  return record
}

function parseRecord(bytes: Uint8Array): SignedRecord {
  try {
    const record: unknown = parseCanonical(bytes)
    checkForm(recordForm, record)
    const problem = signingProblem(record)
    if (problem !== null) throw new Error(problem)
    return record
  } catch (error) {
    throw new RecordMismatch(
      `The bytes to sign are no record (${error instanceof Error ? error.message : 'unreadable'}).`,
    )
  }
}

function checkParties({ laboratory, signing }: SignedRecord, expected: Expected): void {
  demand(laboratory.id === expected.laboratory.id, 'The bytes to sign belong to another laboratory.')
  demand(
    signing.meaning === expected.meaning,
    'The bytes to sign have another meaning than the one you chose.',
  )
  demand(
    signing.signer.subjectId === expected.signer.id && signing.signer.name === expected.signer.name,
    'The bytes to sign name another signer.',
  )
  demand(
    signing.signer.enrolmentSha256 === expected.key.enrolmentSha256,
    'The bytes to sign name another key than yours.',
  )
  demand(
    expected.key.certificate !== null &&
      signing.signer.certificateSha256 === certificateSha256(expected.key.certificate),
    'The bytes to sign name another certificate than yours.',
  )
  const { presentFor } = signing
  const { presence } = expected
  demand(
    (presentFor === null && !presence) ||
      (presentFor?.runId === presence?.runId &&
        presentFor?.from === presence?.from &&
        presentFor?.to === presence?.to),
    'The bytes to sign give another run or other times than you gave.',
  )
}

/** SHA-256 (hex) of the DER inside a PEM certificate. */
function certificateSha256(pem: string): string {
  const base64 = pem.replace(/-----(BEGIN|END) CERTIFICATE-----/g, '').replace(/\s/g, '')
  return sha256Hex(Uint8Array.from(atob(base64), (character) => character.charCodeAt(0)))
}

function checkEntry(record: SignedRecord, { entry, content }: Expected): void {
  demand(
    record.entry.id === entry.id && record.entry.number === entry.number,
    'The bytes to sign belong to another entry.',
  )
  demand(record.entry.title === entry.title, 'The bytes to sign carry another title.')
  demand(
    record.entry.revision >= entry.revision,
    `The bytes to sign are revision ${record.entry.revision}, the screen shows revision ${entry.revision}.`,
  )
  demand(
    record.contentSha256 === contentSha256(record.content),
    'The digest of the text in the bytes to sign is not that of the text.',
  )
  demand(
    record.bodySha256 === sha256Hex(canonicalBytes(bodyOf(record))),
    'The digest in the bytes to sign is not that of what they say.',
  )
  demand(
    record.contentSha256 === contentSha256(content),
    'The text in the bytes to sign is not the text on the screen.',
  )
  demand(
    entry.bodySha256 === null || record.bodySha256 === entry.bodySha256,
    'The bytes to sign are not what the first signer signed.',
  )
}

function checkFiles(record: SignedRecord, entry: Entry): void {
  const shown = new Map(filesToSign(entry).map((file) => [file.id, file]))
  for (const file of record.files) {
    const onScreen = shown.get(file.id)
    demand(
      onScreen !== undefined &&
        onScreen.sha256 === file.sha256 &&
        onScreen.name === file.name &&
        String(onScreen.size) === file.size,
      `The file ${file.name} in the bytes to sign is not on the screen in that form.`,
    )
  }
  demand(record.files.length === shown.size, 'The bytes to sign leave out a file of this entry.')
  const runs = new Set(entry.runs.map((run) => run.id))
  demand(
    record.runs.length === runs.size && record.runs.every((run) => runs.has(run.id)),
    'The bytes to sign name other runs.',
  )
}

function checkCalculations(record: SignedRecord, entry: Entry): void {
  const shown = new Map(entry.calculations.map((each) => [each.id, each]))
  for (const calculation of record.calculations) {
    const onScreen = shown.get(calculation.id)
    demand(
      onScreen !== undefined && onScreen.label === calculation.label && onScreen.kind === calculation.kind,
      `The calculation ${calculation.label} in the bytes to sign is not on the screen.`,
    )
    demand(
      JSON.stringify(onScreen?.figures.map(figureText)) ===
        JSON.stringify(calculation.figures.map(figureText)),
      `The figures of ${calculation.label} in the bytes to sign are not those on the screen.`,
    )
  }
}

const figureText = (figure: { pointer: string; value: string; u: string | null; unit: string | null }) => [
  figure.pointer,
  figure.value,
  figure.u,
  figure.unit ?? '1',
]

function checkStatement(record: SignedRecord, { meaning, presence }: Expected): void {
  const run = record.runs.find((each) => each.id === presence?.runId)
  const sentence = signingStatement(
    meaning,
    { laboratory: record.laboratory.name, ...record.entry },
    presence && run ? { run: run.number, from: presence.from, to: presence.to } : undefined,
  )
  demand(
    record.signing.statement === sentence,
    'The sentence in the bytes to sign is not the one agreed for this meaning.',
  )
}
