import type { Meaning } from '../event-payloads.ts'
import { byKeys } from '../record-order.ts'

/*
 * Names and folders of a bundle (shapes 2). Paths are relative to the top folder unless said otherwise; the builder and every
 * checker take them from here.
 */

export const manifestNames = ['manifest-sha256.txt', 'manifest-sha512.txt'] as const
/** The files that tag manifests list, by path. */
export const tagFiles = ['bag-info.txt', 'bagit.txt', ...manifestNames] as const
export const bagSignaturePath = 'signature/tagmanifest-sha256.sig'
export const bagDeclaration = 'BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n'

/** Files directly under data/ that every bundle has. */
export const dataPath = {
  crate: 'data/ro-crate-metadata.json',
  instructions: 'data/VERIFY.md',
  checker: 'data/check.html',
  description: 'data/bundle.json',
  anchors: 'data/anchors.json',
  head: 'data/ledger/head.json',
  headSignature: 'data/ledger/head.sig',
  headTimeStamp: 'data/ledger/head.tsr',
  rotations: 'data/ledger/rotations.jsonl',
  ca: 'data/pki/ca.pem',
  crl: 'data/pki/crl.pem',
  tsaChain: 'data/pki/tsa-chain.pem',
} as const

export const ledgerKeyFolder = 'data/ledger/keys/'

/** Short name of a digest in paths: its first 16 hex digits. */
export const shortDigest = (hex: string): string => hex.slice(0, 16)

export const ledgerKeyPath = (keySha256: string): string => `${ledgerKeyFolder}${shortDigest(keySha256)}.pem`

export const keyFolder = (subjectId: string, enrolmentSha256: string): string =>
  `data/keys/${subjectId}/${shortDigest(enrolmentSha256)}/`

/** N-07/042 -> N-07-042, the name of an entry's folder. */
export const entryFolderName = (number: string): string => number.replace('/', '-')

export const entryFolder = (number: string): string => `data/entries/${entryFolderName(number)}/`

/** `1-authorship`: position among the living (or the voided) signatures, from 1, and meaning. */
export const signatureFolderName = (position: number, meaning: Meaning): string => `${position}-${meaning}`

/** Files of a signature's folder. */
export const signatureFiles = {
  record: 'record.json',
  signature: 'record.sig',
  certificate: 'signer.pem',
  timeStamp: 'timestamp.tsr',
} as const

/** Files of a calculation's folder; the last two only for kinds that have them. */
export const resultFiles = ['result.json', 'result.csv', 'figure.svg'] as const

/** Notebook and entry number as integers: N-07/042 -> [7, 42]. */
export function entryOrder(number: string): number[] {
  return [...number.matchAll(/\d+/g)].map(([digits]) => Number(digits))
}

/** Orders by notebook, then entry number. */
export const byEntryNumber = byKeys(
  (number: string) => entryOrder(number)[0] ?? 0,
  (number: string) => entryOrder(number)[1] ?? 0,
)

/** What a bundle is of: the middle part of its top folder's name. */
export type BundleScope =
  { kind: 'notebook'; number: string } | { kind: 'entry'; number: string } | { kind: 'selection' }

/** Lower-case letters, digits and single hyphens of a laboratory's name. */
export function laboratorySlug(name: string): string {
  const plain = name.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()
  return plain.replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '') || 'laboratory'
}

/** `<slug>-<N-07 | N-07-042 | selection>-<date>`; the date is that of the head, UTC. */
export function topFolderName(laboratory: string, scope: BundleScope, headTime: string): string {
  const what = scope.kind === 'selection' ? 'selection' : entryFolderName(scope.number)
  return `${laboratorySlug(laboratory)}-${what}-${headTime.slice(0, 10)}`
}

/** Case-blind key of a name: two names with the same key cannot stand in one folder on every disk. */
export function foldedName(name: string): string {
  return name.normalize('NFC').toUpperCase().toLowerCase()
}

/**
 * Name under which a raw file lies in its entry's raw/ folder: its own when that is plain and unique there, else its id
 * and the name with every other character as `_`.
 * @param siblings names of all files of the entry, this one included
 */
export function rawName(file: { id: string; name: string }, siblings: readonly string[]): string {
  const { name } = file
  const folded = foldedName(name)
  const plain =
    /^[A-Za-z0-9._ -]+$/.test(name) &&
    !/^[. ]|[. ]$/.test(name) &&
    siblings.filter((other) => foldedName(other) === folded).length === 1
  return plain ? name : `${file.id}-${name.replace(/[^A-Za-z0-9._ -]/gu, '_')}`
}
