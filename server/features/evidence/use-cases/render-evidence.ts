import { randomUUID } from 'node:crypto'
import { renderedPayload, reachedKeys } from '../../../ledger-format/bundle/index.ts'
import { parseJson } from '../../../ledger-format/canonical-json.ts'
import type { PayloadOf } from '../../../ledger-format/event-payloads.ts'
import type { SignedRecord } from '../../../ledger-format/record.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Services } from '../../../platform/services.ts'
import { findEntry, type EntryRow } from '../../entries/index.ts'
import { keyInputs, rootEnrolmentSha256 } from '../../keys/index.ts'
import { makeHead } from '../../laboratory/index.ts'
import { appendEvent, chainEnd, lockLedger, systemActor } from '../../ledger/index.ts'
import { signaturesOf, type SignatureRow } from '../../signatures/index.ts'
import { finishPdf } from '../finish-pdf.ts'
import { gatherSheet } from '../gather-sheet.ts'
import { printPdf } from '../printer.ts'
import { insertRendition, renditionsOf, type Rendition } from '../repository.ts'
import { sheetHtml } from '../sheet-html.ts'
import type { SheetInput } from '../sheet-input.ts'

type Chains = PayloadOf<'entry.rendered'>['chains']

interface EvidenceFile {
  name: string
  bytes: Buffer
}

/**
 * Makes the evidence set of a sealed entry, once: results, figures, HTML and PDF into the store, then in one transaction
 * their digests as `entry.rendered` and a head that covers it. Called again it does nothing.
 */
export async function renderEvidence(services: Services, entryId: string): Promise<void> {
  const entry = await findEntry(services.db, entryId)
  if (!entry || entry.state !== 'sealed') throw new Error(`Entry ${entryId} is not sealed.`)
  if ((await renditionsOf(services.db, entryId)).length > 0) return
  const input = await gatherSheet(services, entry)
  const signatures = await signaturesOf(services.db, [entryId])
  const files = await evidenceFiles(
    input,
    signatures.filter(({ voidedAt }) => voidedAt === null),
  )
  const stored = await store(services, entryId, files)
  await services.db.transaction(async (t) => {
    await lockLedger(services, t)
    if ((await renditionsOf(services.db, entryId, t)).length > 0) return
    for (const rendition of stored) await insertRendition(services.db, rendition, t)
    const chains = await chainsOf(services, entry, signatures, t)
    await appendEvent(services, t, {
      actor: systemActor,
      action: 'entry.rendered',
      subject: { kind: 'entry', id: entryId },
      payload: renderedPayload(files, chains),
    })
    await makeHead(services, t)
  })
}

async function evidenceFiles(input: SheetInput, living: SignatureRow[]): Promise<EvidenceFile[]> {
  const html = sheetHtml(input)
  const { body } = input
  const pdf = await finishPdf(await printPdf(html), {
    title: `${body.entry.number} ${body.entry.title}`,
    author: body.authors.map(({ name }) => name).join(', '),
    time: new Date(input.seal.time),
    attachments: living.map(({ record, meaning }, at) => ({
      name: `${at + 1}-${meaning}-record.json`,
      bytes: record,
      description: 'The exact bytes that were signed',
    })),
  })
  return [
    { name: 'entry.html', bytes: Buffer.from(html) },
    { name: 'entry.pdf', bytes: pdf },
    ...input.calculations.flatMap(({ label, result, svg, csv }) => [
      { name: `calculations/${label}/result.json`, bytes: result },
      ...(svg === null ? [] : [{ name: `calculations/${label}/figure.svg`, bytes: Buffer.from(svg) }]),
      ...(csv === null ? [] : [{ name: `calculations/${label}/result.csv`, bytes: Buffer.from(csv) }]),
    ]),
  ]
}

/** A try of its own has keys of its own: what an earlier, failed try left is never taken for evidence. */
async function store(services: Services, entryId: string, files: EvidenceFile[]): Promise<Rendition[]> {
  const attempt = randomUUID()
  const stored: Rendition[] = []
  for (const { name, bytes } of files) {
    const objectKey = `evidence/${entryId}/${attempt}/${name}`
    const { versionId, sha256, sha512, size } = await services.storage.putBytes(objectKey, bytes)
    stored.push({ entryId, path: name, sha256, sha512, size, objectKey, objectVersion: versionId })
  }
  return stored
}

/** Where the chains end that a bundle of this entry must show in full: of its keys, and of the entry it amends. */
async function chainsOf(
  services: Services,
  entry: EntryRow,
  signatures: SignatureRow[],
  t: Transaction,
): Promise<Chains> {
  const root = await rootEnrolmentSha256(services, t)
  if (root === null) throw new Error('The laboratory has no root enrolment.')
  const signers = signatures.map(
    ({ record }) => (parseJson(record) as unknown as SignedRecord).signing.signer.enrolmentSha256,
  )
  const keys = reachedKeys(signers, await keyInputs(services, t), root)
  const subjects = [
    ...keys.map(({ enrolment }) => ({ kind: 'key', id: enrolment.id }) as const),
    ...(entry.amendsEntryId === null ? [] : [{ kind: 'entry', id: entry.amendsEntryId } as const]),
  ]
  const chains: Chains = []
  for (const subject of subjects) {
    const end = await chainEnd(services, subject, t)
    if (!end) throw new Error(`The ${subject.kind} ${subject.id} has no events.`)
    chains.push({ ...subject, ...end })
  }
  return chains
}
