import 'reflect-metadata'
import { createHash, randomBytes, webcrypto } from 'node:crypto'
import * as x509 from '@peculiar/x509'

/** Certificates of the laboratory's own authority (Ed25519): its root, those of people, and the list of revoked ones. */

x509.cryptoProvider.set(webcrypto as Crypto)

const algorithm = { name: 'Ed25519' }
const uid = '0.9.2342.19200300.100.1.1'
const caYears = 20
const personYears = 3

export interface IssuedCertificate {
  pem: string
  /** SHA-256 of the DER, hex. */
  sha256: string
  /** Hex. */
  serial: string
  notBefore: Date
  notAfter: Date
}

/** A new root, self-signed, valid for 20 years from `now`; `privateKey` is PKCS#8. */
export async function createAuthority(
  laboratory: { id: string; name: string },
  now: Date,
): Promise<{ certificate: IssuedCertificate; privateKey: Buffer }> {
  const keys = (await webcrypto.subtle.generateKey(algorithm, true, ['sign', 'verify'])) as CryptoKeyPair
  const certificate = await x509.X509CertificateGenerator.createSelfSigned({
    serialNumber: newSerial(),
    name: named(`${laboratory.name} certificate authority`, laboratory.id),
    ...validFor(caYears, now),
    signingAlgorithm: algorithm,
    keys,
    extensions: [
      new x509.BasicConstraintsExtension(true, 0, true),
      new x509.KeyUsagesExtension(x509.KeyUsageFlags.keyCertSign | x509.KeyUsageFlags.cRLSign, true),
      await x509.SubjectKeyIdentifierExtension.create(keys.publicKey),
    ],
  })
  return {
    certificate: describe(certificate),
    privateKey: Buffer.from(await webcrypto.subtle.exportKey('pkcs8', keys.privateKey)),
  }
}

/** The authority opened for signing. */
export interface Authority {
  certificate: x509.X509Certificate
  key: CryptoKey
}

export async function openAuthority(pem: string, pkcs8: Uint8Array): Promise<Authority> {
  const key = await webcrypto.subtle.importKey('pkcs8', Buffer.from(pkcs8), algorithm, false, ['sign'])
  return { certificate: new x509.X509Certificate(pem), key: key as CryptoKey }
}

/** A person's certificate for three years: who they are, for signatures that cannot be denied later. */
export async function issueCertificate(
  authority: Authority,
  person: { name: string; subjectId: string; publicKey: Uint8Array },
  now: Date,
): Promise<IssuedCertificate> {
  const publicKey = await webcrypto.subtle.importKey('raw', Buffer.from(person.publicKey), algorithm, true, [
    'verify',
  ])
  const certificate = await x509.X509CertificateGenerator.create({
    serialNumber: newSerial(),
    subject: named(person.name, person.subjectId),
    issuer: authority.certificate.subjectName,
    ...validFor(personYears, now),
    signingKey: authority.key,
    publicKey,
    signingAlgorithm: algorithm,
    extensions: [
      new x509.BasicConstraintsExtension(false, undefined, true),
      new x509.KeyUsagesExtension(
        x509.KeyUsageFlags.digitalSignature | x509.KeyUsageFlags.nonRepudiation,
        true,
      ),
      await x509.AuthorityKeyIdentifierExtension.create(authority.certificate.publicKey),
    ],
  })
  return describe(certificate)
}

/** The list of revoked certificates (PEM) as of `now`. */
export async function buildRevocationList(
  authority: Authority,
  revoked: { serial: string; at: Date; reason: string }[],
  now: Date,
): Promise<string> {
  const list = await x509.X509CrlGenerator.create({
    issuer: authority.certificate.subjectName,
    thisUpdate: wholeSecond(now),
    nextUpdate: new Date(wholeSecond(now).getTime() + 30 * 86_400_000),
    entries: revoked.map(({ serial, at, reason }) => ({
      serialNumber: serial,
      revocationDate: wholeSecond(at),
      reason: reason === 'superseded' ? x509.X509CrlReason.superseded : x509.X509CrlReason.keyCompromise,
    })),
    extensions: [new x509.AuthorityKeyIdentifierExtension(await keyIdentifier(authority))],
    signingAlgorithm: algorithm,
    signingKey: authority.key,
  })
  return pemOf('X509 CRL', list.rawData)
}

async function keyIdentifier(authority: Authority): Promise<string> {
  const extension = await x509.SubjectKeyIdentifierExtension.create(authority.certificate.publicKey)
  return extension.keyId
}

function describe(certificate: x509.X509Certificate): IssuedCertificate {
  return {
    pem: pemOf('CERTIFICATE', certificate.rawData),
    sha256: createHash('sha256').update(Buffer.from(certificate.rawData)).digest('hex'),
    serial: certificate.serialNumber,
    notBefore: certificate.notBefore,
    notAfter: certificate.notAfter,
  }
}

/** PEM in lines of 64, under the label that OpenSSL knows. */
function pemOf(label: string, der: ArrayBuffer | Uint8Array): string {
  const text = Buffer.from(der as Uint8Array)
    .toString('base64')
    .replace(/.{64}(?=.)/g, '$&\n')
  return `-----BEGIN ${label}-----\n${text}\n-----END ${label}-----\n`
}

// UTF8String whatever the letters: a name is compared byte for byte by the checkers.
const named = (name: string, id: string) =>
  new x509.Name([{ CN: [{ utf8String: name }] }, { [uid]: [{ utf8String: id }] }])
const wholeSecond = (time: Date) => new Date(Math.floor(time.getTime() / 1000) * 1000)
// First byte below 0x80: a serial number is positive.
const newSerial = () => Buffer.concat([Buffer.of(0x4a), randomBytes(15)]).toString('hex')

function validFor(years: number, now: Date) {
  const notBefore = wholeSecond(now)
  const notAfter = new Date(notBefore)
  notAfter.setUTCFullYear(notAfter.getUTCFullYear() + years)
  return { notBefore, notAfter }
}
