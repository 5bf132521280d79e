import type { SignedRecord } from '../record.ts'
import type { VerifiedSignature } from './check-signatures.ts'
import { isInOrder, sameSet } from './in-order.ts'
import { need, present } from './report.ts'

/** Signers of authorship = authors without exception, at least one. */
export function checkAuthors(record: SignedRecord, living: readonly VerifiedSignature[]): void {
  const signers = living
    .filter((signature) => signature.meaning === 'authorship')
    .map((signature) => signature.subjectId)
  const due = record.authors.filter((author) => !author.exception).map((author) => author.subjectId)
  need(due.length > 0 && sameSet(signers, due), 'signers of authorship are not the authors without exception')
}

/** Enough distinct supervisors witnessed, none of them author or contributor, all after the authors. */
export function checkWitnesses(record: SignedRecord, living: readonly VerifiedSignature[]): void {
  const barred = new Set([...record.authors, ...record.contributors].map((person) => person.subjectId))
  const authors = living.filter((signature) => signature.meaning === 'authorship')
  const witnesses = living.filter((signature) => signature.meaning !== 'authorship')
  for (const witness of witnesses) {
    const { role } = witness.read().signing.signer
    need(role === 'supervisor', `a witness is no supervisor: ${witness.name}`)
    need(!barred.has(witness.subjectId), `a witness is author or contributor: ${witness.name}`)
    const at = witness.event?.sequence ?? 0
    const after = authors.every((author) => author.event !== null && author.event.sequence < at)
    need(after, `witnessed before all authors signed: ${witness.name}`)
  }
  const persons = new Set(witnesses.map((witness) => witness.subjectId)).size
  const required = record.entry.witnessesRequired
  need(persons >= required, `${persons} persons witnessed, not ${required}`)
}

/** Folders stand in the order of signing; `earlier` of each is exactly the living signatures before it. */
export function checkEarlier(living: readonly VerifiedSignature[]): void {
  const sequences = living.map((signature) => present(signature.event, 'a signature has no event').sequence)
  need(
    isInOrder(sequences, (sequence) => sequence),
    'folders are not in order of signing',
  )
  living.forEach((signature, i) => {
    const due = living
      .slice(0, i)
      .map((other) =>
        [
          other.recordSha256,
          other.signatureSha256,
          other.meaning,
          other.subjectId,
          other.read().signing.time,
        ].join(' '),
      )
    const have = signature
      .read()
      .signing.earlier.map((item) =>
        [item.recordSha256, item.signatureSha256, item.meaning, item.subjectId, item.time].join(' '),
      )
    need(sameSet(have, due), `\`earlier\` is not exactly the living signatures before: ${signature.name}`)
  })
}
