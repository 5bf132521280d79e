import { BitString, fromBER, OctetString, Sequence, Boolean as Asn1Boolean, Integer } from 'asn1js'
import { Certificate as ParsedCertificate, CertificateRevocationList, ExtKeyUsage } from 'pkijs'
import { sameBytes } from '../bytes.ts'
import { sha256Hex, toHex } from '../digest.ts'
import { rawKeyOf } from '../ed25519.ts'
import { checkDer } from './der.ts'
import { pemBlock, pemBlocks } from './pem.ts'
import { need, Wrong } from './report.ts'
import { signatureHolds, type CertifiedKey } from './x509-signature.ts'

export const oid = {
  basicConstraints: '2.5.29.19',
  keyUsage: '2.5.29.15',
  extKeyUsage: '2.5.29.37',
  subjectKeyIdentifier: '2.5.29.14',
  timeStamping: '1.3.6.1.5.5.7.3.8',
  commonName: '2.5.4.3',
  organization: '2.5.4.10',
  userId: '0.9.2342.19200300.100.1.1',
} as const

/** Extensions whose meaning is honoured here; any other critical one makes a certificate unusable (RFC 5280 4.2). */
const understood: readonly string[] = [oid.basicConstraints, oid.keyUsage, oid.extKeyUsage]

/** A certificate, as far as bundles need it (RFC 5280). */
export interface Certificate {
  der: Uint8Array
  /** SHA-256 of the DER, hex. */
  sha256: string
  serial: string
  /** DER of the names. */
  subject: Uint8Array
  issuer: Uint8Array
  /** Values of an attribute of the subject. */
  subjectValues: (attribute: string) => string[]
  notBefore: Date
  notAfter: Date
  key: CertifiedKey
  /** Null where the certificate has no such extension. */
  authority: { ca: boolean; pathLength: number | null } | null
  keyUsage: { critical: boolean; bits: ReadonlySet<number> } | null
  extendedUsage: { critical: boolean; purposes: string[] } | null
  subjectKeyIdentifier: Uint8Array | null
  /** A critical extension that is not understood here. */
  strange: string | null
  signed: { algorithm: string; data: Uint8Array; signature: Uint8Array }
}

/** Bits of keyUsage (RFC 5280 section 4.2.1.3). */
export const keyUsageBit = { digitalSignature: 0, contentCommitment: 1, keyCertSign: 5, crlSign: 6 } as const

/** Certificates of a PEM file that holds nothing else. */
export function readCertificates(pem: Uint8Array): Certificate[] {
  return pemBlocks(pem, 'CERTIFICATE').map(readCertificate)
}

/** The same few certificates stand beside every signature and stamp: each is read once, each issuance checked once. */
const certificatesRead = new Map<string, Certificate>()
const issuancesChecked = new Map<string, boolean>()

/** Looks an answer up, or finds it and keeps it; what is kept stays small. */
function remembered<T>(memory: Map<string, T>, key: string, find: () => T): T {
  const known = memory.get(key)
  if (known !== undefined) return known
  const found = find()
  if (memory.size >= 500) memory.clear()
  memory.set(key, found)
  return found
}

/** @throws Wrong when the bytes are not exactly one certificate. */
export function readCertificate(der: Uint8Array): Certificate {
  return remembered(certificatesRead, sha256Hex(der), () => parseCertificate(der))
}

function parseCertificate(der: Uint8Array): Certificate {
  checkDer(der)
  const parsed = ParsedCertificate.fromBER(der.slice())
  const extensions = new Map((parsed.extensions ?? []).map((extension) => [extension.extnID, extension]))
  need(extensions.size === (parsed.extensions ?? []).length, 'an extension stands twice')
  const value = (id: string) => extensions.get(id)?.extnValue.valueBlock.valueHexView
  const critical = (id: string) => extensions.get(id)?.critical === true
  const [basic, usage, extended, identifier] = [
    value(oid.basicConstraints),
    value(oid.keyUsage),
    value(oid.extKeyUsage),
    value(oid.subjectKeyIdentifier),
  ]
  return {
    der,
    sha256: sha256Hex(der),
    serial: toHex(parsed.serialNumber.valueBlock.valueHexView),
    subject: nameBytes(parsed.subject),
    issuer: nameBytes(parsed.issuer),
    subjectValues: (attribute) =>
      parsed.subject.typesAndValues
        .filter((item) => item.type === attribute)
        .map((item) => String(item.value.valueBlock.value)),
    notBefore: parsed.notBefore.value,
    notAfter: parsed.notAfter.value,
    key: keyOf(parsed),
    authority: basic ? readBasicConstraints(basic) : null,
    keyUsage: usage ? { critical: critical(oid.keyUsage), bits: readKeyUsage(usage) } : null,
    extendedUsage: extended
      ? { critical: critical(oid.extKeyUsage), purposes: ExtKeyUsage.fromBER(extended.slice()).keyPurposes }
      : null,
    subjectKeyIdentifier: identifier ? octets(identifier) : null,
    strange:
      [...extensions.values()].find((e) => e.critical && !understood.includes(e.extnID))?.extnID ?? null,
    signed: {
      algorithm: parsed.signatureAlgorithm.algorithmId,
      data: parsed.tbsView,
      signature: parsed.signatureValue.valueBlock.valueHexView,
    },
  }
}

type Name = ParsedCertificate['subject']

function nameBytes(name: Name): Uint8Array {
  return new Uint8Array(name.toSchema().toBER())
}

function keyOf(parsed: ParsedCertificate): CertifiedKey {
  const info = parsed.subjectPublicKeyInfo
  const parameters: unknown = info.algorithm.algorithmParams
  return {
    spki: new Uint8Array(info.toSchema().toBER()),
    algorithm: info.algorithm.algorithmId,
    curve: isObjectIdentifier(parameters) ? parameters.valueBlock.toString() : null,
    key: info.subjectPublicKey.valueBlock.valueHexView,
  }
}

function isObjectIdentifier(value: unknown): value is { valueBlock: { toString(): string } } {
  return (value as { idBlock?: { tagNumber: number } } | undefined)?.idBlock?.tagNumber === 6
}

function octets(der: Uint8Array): Uint8Array {
  const { result } = fromBER(der)
  if (!(result instanceof OctetString)) throw new Wrong('an extension is damaged')
  return result.valueBlock.valueHexView
}

function readBasicConstraints(der: Uint8Array): { ca: boolean; pathLength: number | null } {
  const { result } = fromBER(der)
  if (!(result instanceof Sequence)) throw new Wrong('basicConstraints is damaged')
  const ca = result.valueBlock.value.find((item) => item instanceof Asn1Boolean)
  const length = result.valueBlock.value.find((item) => item instanceof Integer)
  return { ca: ca?.valueBlock.value ?? false, pathLength: length ? Number(length.valueBlock.valueDec) : null }
}

function readKeyUsage(der: Uint8Array): Set<number> {
  const { result } = fromBER(der)
  if (!(result instanceof BitString)) throw new Wrong('keyUsage is damaged')
  const bytes = result.valueBlock.valueHexView
  const bits = Array.from({ length: bytes.length * 8 }, (_, bit) => bit)
  return new Set(bits.filter((bit) => ((bytes[bit >> 3] ?? 0) >> (7 - (bit & 7))) & 1))
}

/** Raw Ed25519 key of a certificate. */
export function ed25519KeyOf(certificate: Certificate): Uint8Array {
  return rawKeyOf(certificate.key.spki)
}

export const isSelfIssued = (certificate: Certificate): boolean =>
  sameBytes(certificate.subject, certificate.issuer)

/** Throws unless `issuer` signed this certificate or revocation list. */
export function checkIssuedBy(
  item: { issuer: Uint8Array; signed: Certificate['signed'] },
  issuer: Certificate,
): void {
  need(sameBytes(item.issuer, issuer.subject), 'issuer is another')
  const { algorithm, data, signature } = item.signed
  need(signatureHolds(issuer.key, algorithm, data, signature), 'signature of the issuer does not verify')
}

function checkUsableAt(certificate: Certificate, at: Date): void {
  need(certificate.strange === null, `critical extension ${certificate.strange} is not understood`)
  const seconds = Math.floor(at.getTime() / 1000) * 1000
  need(certificate.notBefore.getTime() <= seconds, 'certificate is not yet valid')
  need(seconds <= certificate.notAfter.getTime(), 'certificate has expired')
}

function mayIssue(certificate: Certificate, below: number): boolean {
  const { authority, keyUsage } = certificate
  if (authority?.ca !== true || (keyUsage && !keyUsage.bits.has(keyUsageBit.keyCertSign))) return false
  return authority.pathLength === null || below <= authority.pathLength
}

/**
 * Throws unless a path leads from a certificate over others to a self-signed one among `roots` and all of it is valid at
 * the time. `others` may hold intermediates.
 */
export function checkPath(
  leaf: Certificate,
  others: readonly Certificate[],
  roots: readonly Certificate[],
  at: Date,
): void {
  let [current, below] = [leaf, 0]
  checkUsableAt(leaf, at)
  for (let steps = 0; steps < 10; steps++) {
    const root = roots.find((candidate) => candidate.sha256 === current.sha256)
    if (root && isSelfIssued(root)) return need(signedBy(root, root), 'the root did not sign itself')
    const issuer = [...roots, ...others].find(
      (candidate) =>
        sameBytes(candidate.subject, current.issuer) &&
        candidate.sha256 !== current.sha256 &&
        signedBy(current, candidate),
    )
    if (!issuer) throw new Wrong('no path to a root that is known here')
    need(mayIssue(issuer, below), 'a certificate of the path may not issue others')
    checkUsableAt(issuer, at)
    ;[current, below] = [issuer, below + 1]
  }
  throw new Wrong('the path of certificates is too long')
}

function signedBy(item: Certificate, issuer: Certificate): boolean {
  return remembered(issuancesChecked, `${item.sha256} ${issuer.sha256}`, () => {
    try {
      checkIssuedBy(item, issuer)
      return true
    } catch {
      return false
    }
  })
}

/** A certificate revocation list: serial numbers (hex) and when each was revoked. */
export interface RevocationList {
  revoked: ReadonlyMap<string, Date>
}

/** Reads a PEM revocation list that the authority signed. */
export function readRevocationList(pem: Uint8Array, authority: Certificate): RevocationList {
  const der = pemBlock(pem, 'X509 CRL')
  checkDer(der)
  const parsed = CertificateRevocationList.fromBER(der.slice())
  checkIssuedBy(
    {
      issuer: nameBytes(parsed.issuer),
      signed: {
        algorithm: parsed.signatureAlgorithm.algorithmId,
        data: parsed.tbsView,
        signature: parsed.signatureValue.valueBlock.valueHexView,
      },
    },
    authority,
  )
  const revoked = (parsed.revokedCertificates ?? []).map(
    (item) => [toHex(item.userCertificate.valueBlock.valueHexView), item.revocationDate.value] as const,
  )
  return { revoked: new Map(revoked) }
}
