import { dataPath } from '../bundle/layout.ts'
import { sameBytes } from '../bytes.ts'
import type { LedgerEvent } from '../event.ts'
import type { Case } from './case.ts'
import { eventsOf } from './check-events.ts'
import type { VerifiedKey } from './check-keys.ts'
import type { VerifiedSignature } from './check-signatures.ts'
import { need, present, Wrong } from './report.ts'
import { checkPath, ed25519KeyOf, keyUsageBit, oid, readCertificates, type Certificate } from './x509.ts'

/**
 * Who signed (shapes 1, "Checks, keys"): the certificate that the record names, certified and endorsed before the signature and
 * not revoked then, by the ledger's order. Answers the raw public key.
 */
export function checkSigner(c: Case, signature: VerifiedSignature, signed: LedgerEvent): Uint8Array {
  const { signer } = signature.read().signing
  const certificate = readSigner(c, signature)
  need(certificate.sha256 === signer.certificateSha256, 'not the certificate that the record names')
  const key = present(c.keys.get(signer.enrolmentSha256), 'the enrolment named is not in the bundle')
  checkOrder(key, certificate, signed)
  const at = new Date(signed.time)
  need(certificate.notBefore <= at && at <= certificate.notAfter, 'signed outside the certificate’s dates')
  const publicKey = ed25519KeyOf(certificate)
  need(sameBytes(publicKey, key.publicKey), 'certificate of another key than the enrolment’s')
  const [uid, ...moreUids] = certificate.subjectValues(oid.userId)
  const isSigner = uid === key.enrolment.subjectId && uid === signer.subjectId && moreUids.length === 0
  need(isSigner, 'UID is not the signer')
  need(certificate.subjectValues(oid.commonName).join('\n') === signer.name, 'CN is not the signer’s name')
  checkUse(c, certificate, at)
  checkRevocations(c, certificate, key, at, signature.file('certificate'))
  return publicKey
}

function readSigner(c: Case, signature: VerifiedSignature): Certificate {
  const [certificate, ...more] = readCertificates(c.read(signature.file('certificate')))
  if (!certificate || more.length > 0) throw new Wrong('not one certificate')
  return certificate
}

function checkOrder(key: VerifiedKey, certificate: Certificate, signed: LedgerEvent): void {
  const certified = eventsOf(key.events, 'key.certified').find(
    ({ payload }) => payload.certificateSha256 === certificate.sha256,
  )
  if (!certified || certified.event.sequence >= signed.sequence)
    throw new Wrong('no key.certified names it before the signature')
  const { sequence } = certified.event
  need(
    Date.parse(certified.payload.notAfter) === certificate.notAfter.getTime(),
    'notAfter differs from its event',
  )
  need(key.opensAt() < Math.min(sequence, signed.sequence), 'key was not endorsed before')
  need(!key.isRevokedBefore(signed.sequence) && !key.isRevokedBefore(sequence), 'key was revoked before')
}

function checkUse(c: Case, certificate: Certificate, at: Date): void {
  const usage = present(certificate.keyUsage, 'certificate has no key usage')
  const { digitalSignature, contentCommitment, keyCertSign } = keyUsageBit
  const right = usage.critical && usage.bits.has(digitalSignature) && usage.bits.has(contentCommitment)
  need(right && !usage.bits.has(keyCertSign), 'key usage is another')
  checkPath(certificate, [], [c.ca], at)
}

/** The ledger's order decides; lists must not contradict it. They know whole seconds only. */
function checkRevocations(c: Case, certificate: Certificate, key: VerifiedKey, at: Date, path: string): void {
  const own = c.crl?.revoked.get(certificate.serial)
  const told = eventsOf(key.events, 'key.revoked').length > 0
  need(own === undefined || told, `${dataPath.crl} revokes it, but no key.revoked stands in its chain`)
  const second = Math.floor(at.getTime() / 1000) * 1000
  for (const revoked of [own, c.laterCrl?.revoked.get(certificate.serial)]) {
    if (!revoked) continue
    need(revoked.getTime() >= second, 'revoked before the signature by a revocation list')
    c.report.remark('revocation', path, `revoked ${revoked.toISOString()}, after the signature`)
  }
}
