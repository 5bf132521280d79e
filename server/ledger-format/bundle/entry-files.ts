import { parseJson } from '../canonical-json.ts'
import type { SignedRecord } from '../record.ts'
import { byKeys } from '../record-order.ts'
import type { MerkleTree } from '../merkle.ts'
import { utf8Bytes } from '../utf8.ts'
import type { EntryInput, SignatureInput } from './bundle-input.ts'
import type { CrateEntry } from './crate.ts'
import type { BundleDescription, LeftOut } from './description.ts'
import { entryFolder, rawName, signatureFiles, signatureFolderName } from './layout.ts'
import { ledgerPart } from './proofs.ts'

/** What an entry adds to a bundle. Paths begin with data/; those in `raw` and `crate` are relative to it. */
export interface EntryPart {
  files: { path: string; bytes: Uint8Array }[]
  rawFiles: { path: string; id: string; size: string; sha256: string; sha512: string }[]
  raw: BundleDescription['raw']
  leftOut: LeftOut[]
  signers: string[]
  crate: CrateEntry
}

const fromData = (path: string) => path.slice('data/'.length)

/** Files of one entry's folder. @throws when an event is not the ledger's. */
export function entryPart(entry: EntryInput, tree: MerkleTree, treeSize: number): EntryPart {
  const folder = entryFolder(entry.number)
  const living = entry.signatures.map(read)
  const voided = entry.voided.map(read)
  const bounds = [...living, ...voided].map(({ record }) => record.signing.ledger.sequence)
  const ledger = ledgerPart(entry.events, bounds, tree, treeSize)
  const raw = rawPart(entry, folder)
  const rendered = entry.rendered.map(({ name, bytes }) => ({ path: folder + name, bytes }))
  const livingFiles = living.map((signature, i) => signatureFolder(`${folder}signatures/`, i + 1, signature))
  const voidedFiles = voided.map((signature, i) => signatureFolder(`${folder}voided/`, i + 1, signature))
  return {
    files: [
      ...rendered,
      ...[...livingFiles, ...voidedFiles].flat(),
      { path: `${folder}ledger/events.jsonl`, bytes: ledger.events },
      { path: `${folder}ledger/proofs.json`, bytes: ledger.proofs },
    ],
    ...raw,
    signers: [...living, ...voided].map(({ record }) => record.signing.signer.enrolmentSha256),
    crate: {
      folder: fromData(folder),
      records: living.map(({ record }, i) => ({ path: fromData(livingFiles[i]?.[0]?.path ?? ''), record })),
      raw: new Map(raw.raw.map((item) => [item.fileId, item.path])),
      results: rendered.map(({ path }) => fromData(path)).filter((path) => path.includes('/calculations/')),
    },
  }
}

interface ReadSignature {
  input: SignatureInput
  record: SignedRecord
}

function read(input: SignatureInput): ReadSignature {
  return { input, record: parseJson(input.record) as unknown as SignedRecord }
}

function signatureFolder(base: string, position: number, { input, record }: ReadSignature) {
  const folder = `${base}${signatureFolderName(position, record.signing.meaning)}/`
  const files = [
    { path: folder + signatureFiles.record, bytes: input.record },
    { path: folder + signatureFiles.signature, bytes: input.signature },
    { path: folder + signatureFiles.certificate, bytes: utf8Bytes(input.certificatePem) },
  ]
  return input.timeStamp
    ? [...files, { path: folder + signatureFiles.timeStamp, bytes: input.timeStamp }]
    : files
}

function rawPart(entry: EntryInput, folder: string): Pick<EntryPart, 'rawFiles' | 'raw' | 'leftOut'> {
  const names = entry.files.map((file) => file.name)
  const files = [...entry.files].sort(byKeys((file) => file.id))
  const there = files.filter((file) => !file.leftOut)
  const rawFiles = there.map(({ id, size, sha256, sha512, ...file }) => ({
    path: `${folder}raw/${rawName({ id, ...file }, names)}`,
    id,
    size,
    sha256,
    sha512,
  }))
  return {
    rawFiles,
    raw: rawFiles.map(({ path, id, size, sha256 }) => ({ fileId: id, path: fromData(path), size, sha256 })),
    leftOut: files
      .filter((file) => file.leftOut)
      .map((file) => ({ kind: 'raw', id: file.id, number: null, reason: 'by-choice' })),
  }
}
