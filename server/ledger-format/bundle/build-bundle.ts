import { concatBytes } from '@noble/hashes/utils.js'
import { anchorsBytes } from '../anchors.ts'
import { canonicalBytes, parseJson } from '../canonical-json.ts'
import { sha256Hex, toBase64, toHex } from '../digest.ts'
import { spkiOf } from '../ed25519.ts'
import { headBytes } from '../head.ts'
import type { SignedRecord } from '../record.ts'
import { utf8Bytes } from '../utf8.ts'
import { bagFiles, byPath, digested, type Digested } from './bag.ts'
import type { Bundle, BundleFile, BundleInput } from './bundle-input.ts'
import { crateDocument } from './crate.ts'
import type { BundleDescription } from './description.ts'
import { entryPart, type EntryPart } from './entry-files.ts'
import { instructions } from './instructions.ts'
import {
  byEntryNumber,
  dataPath,
  entryFolderName,
  keyFolder,
  ledgerKeyPath,
  topFolderName,
} from './layout.ts'
import { ledgerPart } from './proofs.ts'
import { reachedKeys } from './reached-keys.ts'

interface Plain {
  path: string
  bytes: Uint8Array
}

/**
 * The files of a bundle in packing order (shapes 2). The same input gives the same bytes. Raw files are listed by id, to be
 * streamed from the store while the zip is written (stored, not compressed, with a fixed date).
 * @throws when the parts do not belong together: head and tree, keys, events.
 */
export function buildBundle(input: BundleInput): Bundle {
  const { treeSize } = input.head
  if (toHex(input.tree.root(treeSize)) !== input.head.rootHash)
    throw new Error('The head is not one of this ledger.')
  const entries = [...input.entries].sort((a, b) => byEntryNumber(a.number, b.number))
  const parts = entries.map((entry) => entryPart(entry, input.tree, treeSize))
  const topFolder = topFolderName(input.laboratory.name, input.scope, input.head.time)
  const demo = isDemo(input)
  const description = describe(input, entries, parts)
  const plain: Plain[] = [
    ...parts.flatMap((part) => part.files),
    ...keyFiles(input, parts),
    ...ledgerFiles(input),
    { path: dataPath.description, bytes: canonicalBytes(description) },
    {
      path: dataPath.instructions,
      bytes: utf8Bytes(
        instructions({
          topFolder,
          bagKeySha256: description.bagKeySha256,
          laboratory: input.laboratory.name,
          demo,
        }),
      ),
    },
    { path: dataPath.checker, bytes: input.checkerHtml },
  ]
  const raw = parts.flatMap((part) => part.rawFiles)
  const crate = {
    path: dataPath.crate,
    bytes: canonicalBytes(crateOf(input, topFolder, demo, parts, [...plain, ...raw])),
  }
  const payload: Digested[] = [
    ...[...plain, crate].map(({ path, bytes }) => digested(path, bytes)),
    ...raw.map((file) => ({ ...file, size: Number(file.size) })),
  ]
  const info = {
    organization: input.laboratory.name,
    topFolder,
    date: input.head.time.slice(0, 10),
    description: `Sealed laboratory notebook entries with signatures and ledger proofs${demo ? ' (demonstration laboratory)' : ''}`,
  }
  const files: BundleFile[] = [
    ...bagFiles(payload, info, input.sign),
    ...[...plain, crate, ...raw.map(({ path, id, size }) => ({ path, raw: id, size }))].sort(byPath),
  ]
  return { topFolder, files: files.map((file) => ({ ...file, path: `${topFolder}/${file.path}` })) }
}

function isDemo(input: BundleInput): boolean {
  const first = input.entries[0]?.signatures[0]
  return first !== undefined && (parseJson(first.record) as unknown as SignedRecord).laboratory.demo
}

function describe(
  input: BundleInput,
  entries: BundleInput['entries'],
  parts: readonly EntryPart[],
): BundleDescription {
  const current = input.ledgerKeys.at(-1)
  if (!current) throw new Error('A bundle needs the ledger keys.')
  const { treeSize, rootHash, keySha256 } = input.head
  return {
    schema: 'halfsilver-bundle/1',
    laboratory: input.laboratory.id,
    release: input.release,
    head: { treeSize, rootHash, keySha256 },
    bagKeySha256: sha256Hex(spkiOf(current)),
    entries: entries.map(({ entryId, number }) => ({ entryId, number, folder: entryFolderName(number) })),
    raw: parts.flatMap((part) => part.raw),
    leftOut: [
      ...[...input.leftOut].sort((a, b) => byEntryNumber(a.number, b.number)),
      ...parts.flatMap((part) => part.leftOut),
    ],
  }
}

function keyFiles(input: BundleInput, parts: readonly EntryPart[]): Plain[] {
  const signers = parts.flatMap((part) => part.signers)
  return reachedKeys(signers, input.keys, input.anchors.rootEnrolmentSha256).flatMap((key) => {
    const folder = keyFolder(key.enrolment.subjectId, key.enrolmentSha256)
    const { events, proofs } = ledgerPart(key.input.events, [], input.tree, input.head.treeSize)
    const endorsement = key.input.endorsement
    return [
      { path: `${folder}enrolment.json`, bytes: key.input.enrolment },
      { path: `${folder}enrolment.sig`, bytes: key.input.enrolmentSignature },
      ...(endorsement
        ? [
            { path: `${folder}endorsement.json`, bytes: endorsement.document },
            { path: `${folder}endorsement.sig`, bytes: endorsement.signature },
          ]
        : []),
      { path: `${folder}events.jsonl`, bytes: events },
      { path: `${folder}proofs.json`, bytes: proofs },
    ]
  })
}

function ledgerFiles(input: BundleInput): Plain[] {
  const rotations = input.rotations.flatMap((rotation) => [canonicalBytes(rotation), Uint8Array.of(10)])
  const stamp = input.headTimeStamp
  return [
    { path: dataPath.anchors, bytes: anchorsBytes(input.anchors) },
    { path: dataPath.head, bytes: headBytes(input.head) },
    { path: dataPath.headSignature, bytes: input.headSignature },
    ...(stamp ? [{ path: dataPath.headTimeStamp, bytes: stamp }] : []),
    { path: dataPath.rotations, bytes: concatBytes(...rotations) },
    ...input.ledgerKeys.map((key) => ({
      path: ledgerKeyPath(sha256Hex(spkiOf(key))),
      bytes: utf8Bytes(publicKeyPem(key)),
    })),
    { path: dataPath.ca, bytes: utf8Bytes(input.pki.caPem) },
    { path: dataPath.crl, bytes: utf8Bytes(input.pki.crlPem) },
    { path: dataPath.tsaChain, bytes: utf8Bytes(input.pki.tsaChainPem) },
  ]
}

/** PEM of an Ed25519 public key (SubjectPublicKeyInfo, RFC 7468). */
export function publicKeyPem(publicKey: Uint8Array): string {
  return `-----BEGIN PUBLIC KEY-----\n${toBase64(spkiOf(publicKey))}\n-----END PUBLIC KEY-----\n`
}

function crateOf(
  input: BundleInput,
  topFolder: string,
  demo: boolean,
  parts: readonly EntryPart[],
  files: readonly { path: string }[],
): unknown {
  return crateDocument({
    name: topFolder,
    laboratory: { ...input.laboratory, demo },
    published: input.head.time,
    release: input.release,
    paths: files.map(({ path }) => path.slice('data/'.length)).sort(),
    entries: parts.map((part) => part.crate),
  })
}
