/* What the server and the client call. docs/ledger.md tells how the parts go together. */
export * from './anchors.ts'
export { sameBytes } from './bytes.ts'
export { canonicalBytes, parseCanonical, parseJson, type Json } from './canonical-json.ts'
export { ChainChecker, verifyChain, type ChainResult, type StoredEvent } from './chain.ts'
export { contentSha256, placedCalculations, quotesIn, readingSha256 } from './content.ts'
export { fromBase64, fromHex, sha256Hex, sha512Hex, toBase64, toHex } from './digest.ts'
export { isUsablePublicKey, publicKeyOf, rawKeyOf, signMessage, spkiOf, verifySignature } from './ed25519.ts'
export * from './endorsement.ts'
export * from './enrolment.ts'
export {
  buildEvent,
  checkEvent,
  describeEvent,
  noPrevious,
  payloadOf,
  type Actor,
  type BuiltEvent,
  type LedgerEvent,
  type Subject,
} from './event.ts'
export { eventPayloads, type KnownAction, type Meaning, type PayloadOf } from './event-payloads.ts'
export { checkForm } from './forms.ts'
export * from './head.ts'
export {
  appendLeaf,
  emptyFrontier,
  leafHash,
  MerkleTree,
  rootOf,
  rootOfFrontier,
  verifyConsistency,
  verifyInclusion,
  type Frontier,
} from './merkle.ts'
export {
  bodyOf,
  buildBody,
  buildRecord,
  describeBody,
  overlaps,
  recordBytes,
  recordForm,
  type BuiltBody,
  type BuiltRecord,
  type SignedRecord,
  type Signing,
} from './record.ts'
export type { RecordBody, RecordCalculation, RecordFile } from './record-body.ts'
export * from './rotation.ts'
export { endorsementStatement, enrolmentStatement, signingStatement, type SignedEntry } from './statements.ts'
export { utf8Bytes, utf8Text } from './utf8.ts'
