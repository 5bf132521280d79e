import { canonicalBytes, parseCanonical } from '../canonical-json.ts'
import { contentSha256 } from '../content.ts'
import { signatureFiles, signatureFolderName } from '../bundle/layout.ts'
import { sameBytes } from '../bytes.ts'
import { sha256Hex } from '../digest.ts'
import type { LedgerEvent } from '../event.ts'
import { checkForm } from '../forms.ts'
import { bodyOf, recordForm, signingProblem, type SignedRecord } from '../record.ts'
import type { Case } from './case.ts'
import { eventsOf, type VerifiedEvent } from './check-events.ts'
import { clockMargin } from './check-head.ts'
import { checkSigner } from './check-signer.ts'
import { Missing, need, present, Wrong } from './report.ts'
import { checkSigned } from './signed-by.ts'
import { checkTimeStamp } from './time-stamp.ts'
import { isInOrder } from './in-order.ts'
import { readCertificates } from './x509.ts'

/** Bytes prepared may be signed for 15 minutes (shapes 1, "Checks, living signatures"). */
const preparedFor = 15 * 60_000

/** One folder of signatures/ or voided/. */
export class VerifiedSignature {
  record: SignedRecord | null = null
  recordSha256 = ''
  signatureSha256 = ''
  event: LedgerEvent | null = null

  constructor(
    /** The folder, with its slash at the end. */
    readonly path: string,
    readonly name: string,
  ) {}

  file(kind: keyof typeof signatureFiles): string {
    return this.path + signatureFiles[kind]
  }

  read(): SignedRecord {
    return present(this.record, `${this.file('record')} could not be read`)
  }

  get meaning(): SignedRecord['signing']['meaning'] {
    return this.read().signing.meaning
  }

  get subjectId(): string {
    return this.read().signing.signer.subjectId
  }
}

/** Reads the folders of signatures/ or voided/ in their order. */
export function readSignatures(c: Case, base: string): VerifiedSignature[] {
  const number = (name: string) => Number(/^\d*/.exec(name)?.[0] || 0)
  const names = c.folders(base).sort((a, b) => number(a) - number(b) || (a < b ? -1 : 1))
  return names.map((name, i) => {
    const signature = new VerifiedSignature(`${base}${name}/`, name)
    c.report.check('record', signature.file('record'), () => {
      const bytes = c.read(signature.file('record'))
      signature.recordSha256 = sha256Hex(bytes)
      const value = parseCanonical(bytes) as unknown
      if (typeof value !== 'object' || value === null) throw new Wrong('not a record')
      signature.record = value as SignedRecord
      checkForm(recordForm, value)
      need(name === signatureFolderName(i + 1, value.signing.meaning), 'folder is not `<k>-<meaning>`')
    })
    c.report.check('signature length', signature.file('signature'), () => {
      const bytes = c.read(signature.file('signature'))
      signature.signatureSha256 = sha256Hex(bytes)
      need(bytes.length === 64, 'not 64 bytes')
    })
    return signature
  })
}

export interface EntryPlace {
  entryId: string
  number: string
}

/** Checks common to living and voided signatures: digests, event, signer, signature, time stamp. */
export function checkSignature(
  c: Case,
  entry: EntryPlace,
  signature: VerifiedSignature,
  events: readonly VerifiedEvent[],
): void {
  const [recordPath, signaturePath] = [signature.file('record'), signature.file('signature')]
  c.report.check('record digests', recordPath, () => checkRecord(c, entry, signature.read()))
  c.report.check('signature event', recordPath, () => checkSignatureEvent(entry, signature, events))
  const certifiedKey = c.report.check('signer', signature.file('certificate'), () => {
    c.call(signature.file('certificate'))
    return checkSigner(
      c,
      signature,
      present(signature.event, 'no event, so no time to judge the certificate by'),
    )
  })
  c.report.check('signature', signaturePath, () => {
    const enrolled = () =>
      present(
        c.keys.get(signature.read().signing.signer.enrolmentSha256),
        'the signer’s enrolment is not in the bundle',
      )
    checkSigned(certifiedKey ?? enrolled().publicKey, c.read(recordPath), c.read(signaturePath))
  })
  c.report.check('time stamp', signature.file('timeStamp'), () => checkStamp(c, signature))
}

function checkRecord(c: Case, entry: EntryPlace, record: SignedRecord): void {
  need(contentSha256(record.content) === record.contentSha256, 'contentSha256 does not recompute')
  need(sha256Hex(canonicalBytes(bodyOf(record))) === record.bodySha256, 'bodySha256 does not recompute')
  need(record.laboratory.id === c.bundle.laboratory, 'another laboratory')
  need(record.entry.id === entry.entryId && record.entry.number === entry.number, 'another entry')
  need(record.entry.number.split('/')[0] === record.notebook.number, 'another notebook')
  const problem = signingProblem(record)
  need(problem === null, problem ?? '')
  const { opened, earlier } = record.signing
  need(
    isInOrder(
      opened ?? [],
      (item) => item.time,
      (item) => item.id,
    ),
    '`opened` is not in order',
  )
  need(
    isInOrder(
      earlier,
      (item) => item.time,
      (item) => item.recordSha256,
    ),
    '`earlier` is not in order',
  )
}

function checkSignatureEvent(
  entry: EntryPlace,
  signature: VerifiedSignature,
  events: readonly VerifiedEvent[],
): void {
  const named = eventsOf(events, 'entry.signed').filter(
    ({ payload }) => payload.recordSha256 === signature.recordSha256,
  )
  const [only, ...more] = named
  if (!only || more.length > 0) throw new Wrong('not named by one entry.signed')
  const { event, payload } = only
  signature.event = event
  const { signing, bodySha256 } = signature.read()
  need(event.subject.kind === 'entry' && event.subject.id === entry.entryId, 'event of another subject')
  need(
    event.actor.kind === 'person' && event.actor.id === signature.subjectId,
    'the event’s actor is not the signer',
  )
  const { recordSha256, signatureSha256, meaning } = signature
  const due = canonicalBytes({ recordSha256, signatureSha256, meaning, bodySha256 })
  need(sameBytes(canonicalBytes(payload), due), 'event names other digests or meaning')
  need(signing.ledger.sequence < event.sequence, 'lower bound is not below the signature’s own event')
  const late = Date.parse(event.time) - Date.parse(signing.time)
  need(
    late >= -clockMargin && late <= preparedFor + clockMargin,
    'time signed is not that of the event (15 minutes are allowed)',
  )
}

function checkStamp(c: Case, signature: VerifiedSignature): void {
  const path = signature.file('timeStamp')
  if (!c.call(path)) throw new Missing('not yet time-stamped')
  const { time } = checkTimeStamp(c.read(signature.file('signature')), c.read(path), c.tsaChain)
  const { signing } = signature.read()
  need(time.getTime() >= Date.parse(signing.time) - clockMargin, 'stamped before the time signed')
  const key = present(
    c.keys.get(signing.signer.enrolmentSha256),
    'the signer’s enrolment is not in the bundle',
  )
  const revoked = eventsOf(key.events, 'key.revoked').some(
    ({ event }) => Date.parse(event.time) < time.getTime(),
  )
  const ended = readCertificates(c.read(signature.file('certificate'))).some(
    (certificate) => certificate.notAfter < time,
  )
  if (revoked || ended) c.report.remark('time stamp', path, 'stamped after the key’s end')
}
