import type { Anchors } from '../anchors.ts'
import type { LedgerEvent } from '../event.ts'
import type { Head } from '../head.ts'
import type { MerkleTree } from '../merkle.ts'
import type { Rotation } from '../rotation.ts'
import type { LeftOut } from './description.ts'
import type { BundleScope } from './layout.ts'

/** One signature as stored. */
export interface SignatureInput {
  /** record.json, the signed bytes. */
  record: Uint8Array
  /** Raw 64 bytes. */
  signature: Uint8Array
  certificatePem: string
  /** RFC 3161 response over `signature`, DER; null while there is none. */
  timeStamp: Uint8Array | null
}

/** A raw file of an entry or of its runs; its bytes are streamed later from the store. */
export interface RawFileInput {
  id: string
  name: string
  /** Bytes, as text. */
  size: string
  sha256: string
  sha512: string
  /** True when the exporter chose to leave its bytes out. */
  leftOut: boolean
}

export interface EntryInput {
  entryId: string
  number: string
  /** Living signatures in the order of their events. */
  signatures: SignatureInput[]
  /** Voided signatures in the order of their events. */
  voided: SignatureInput[]
  /** entry.pdf, entry.html and `calculations/C1/result.json` …, as named by entry.rendered. */
  rendered: { name: string; bytes: Uint8Array }[]
  files: RawFileInput[]
  /** Events of the entry and of the runs filed into it, in any order; those after the head are left away. */
  events: LedgerEvent[]
}

export interface KeyInput {
  /** enrolment.json, the bytes that the key signed. */
  enrolment: Uint8Array
  enrolmentSignature: Uint8Array
  /** Null for the root enrolment alone. */
  endorsement: { document: Uint8Array; signature: Uint8Array } | null
  events: LedgerEvent[]
}

/** Everything of a bundle, as plain data that the caller loads. */
export interface BundleInput {
  laboratory: { id: string; name: string }
  release: string
  scope: BundleScope
  head: Head
  headSignature: Uint8Array
  headTimeStamp: Uint8Array | null
  /** Tree over the ledger's leaf hashes, at least up to the head. */
  tree: MerkleTree
  anchors: Anchors
  rotations: Rotation[]
  /** Raw public keys (32 bytes), first to current. */
  ledgerKeys: Uint8Array[]
  pki: { caPem: string; crlPem: string; tsaChainPem: string }
  /** Keys of the laboratory; the bundle takes those that its signatures lead to, and the root. */
  keys: KeyInput[]
  entries: EntryInput[]
  /** Entries that the bundle leaves out. */
  leftOut: Extract<LeftOut, { kind: 'entry' }>[]
  checkerHtml: Uint8Array
  /** Ed25519 by the ledger key in force now: 64 bytes over the bytes given. */
  sign: (bytes: Uint8Array) => Uint8Array
}

/** A file of the bundle, in its place; a raw one is streamed from the store by its id. */
export type BundleFile = { path: string; bytes: Uint8Array } | { path: string; raw: string; size: string }

export interface Bundle {
  topFolder: string
  /** In the order in which they are to be packed; each path begins with the top folder. */
  files: BundleFile[]
}
