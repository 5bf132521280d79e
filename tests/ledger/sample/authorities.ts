import 'reflect-metadata'
import { webcrypto } from 'node:crypto'
import * as asn1js from 'asn1js'
import * as pkijs from 'pkijs'
import * as x509 from '@peculiar/x509'
import { sha256Hex, fromHex } from '../../../server/ledger-format/digest.ts'
import { spkiOf, publicKeyOf } from '../../../server/ledger-format/ed25519.ts'

/*
 * Certificate and time-stamp authorities of the invented laboratory, made with other packages than the checks use for their
 * verdict: certificates by @peculiar/x509 and WebCrypto, stamps by pkijs and WebCrypto.
 */

x509.cryptoProvider.set(webcrypto as Crypto)
pkijs.setEngine('node', new pkijs.CryptoEngine({ name: 'node', crypto: webcrypto as Crypto }))
const subtle = webcrypto.subtle

const pkcs8Prefix = fromHex('302e020100300506032b657004220420')

/** WebCrypto pair of an Ed25519 seed. */
async function ed25519Pair(seed: Uint8Array): Promise<CryptoKeyPair> {
  const privateKey = await subtle.importKey(
    'pkcs8',
    Uint8Array.from([...pkcs8Prefix, ...seed]),
    'Ed25519',
    true,
    ['sign'],
  )
  const publicKey = await subtle.importKey('spki', spkiOf(publicKeyOf(seed)).slice(), 'Ed25519', true, [
    'verify',
  ])
  return { privateKey, publicKey } as CryptoKeyPair
}

export interface IssuedCertificate {
  pem: string
  sha256: string
  notAfter: string
  serial: string
}

function issued(certificate: x509.X509Certificate): IssuedCertificate {
  return {
    pem: `${certificate.toString('pem')}\n`,
    sha256: sha256Hex(new Uint8Array(certificate.rawData)),
    notAfter: certificate.notAfter.toISOString(),
    serial: certificate.serialNumber,
  }
}

/** The laboratory's certificate authority (Ed25519). */
export class CertificateAuthority {
  private constructor(
    private readonly keys: CryptoKeyPair,
    private readonly certificate: x509.X509Certificate,
    private readonly start: Date,
  ) {}

  static async open(seed: Uint8Array, name: string, start: Date): Promise<CertificateAuthority> {
    const keys = await ed25519Pair(seed)
    const certificate = await x509.X509CertificateGenerator.createSelfSigned({
      serialNumber: '01',
      name: `CN=${name}`,
      notBefore: start,
      notAfter: years(start, 20),
      signingAlgorithm: { name: 'Ed25519' },
      keys,
      extensions: [
        new x509.BasicConstraintsExtension(true, 0, true),
        new x509.KeyUsagesExtension(x509.KeyUsageFlags.keyCertSign | x509.KeyUsageFlags.cRLSign, true),
      ],
    })
    return new CertificateAuthority(keys, certificate, start)
  }

  get root(): IssuedCertificate {
    return issued(this.certificate)
  }

  /** A person's certificate: CN = name, UID = subject id, 3 years. */
  async certify(person: {
    name: string
    subjectId: string
    seed: Uint8Array
    serial: string
  }): Promise<IssuedCertificate> {
    const { publicKey } = await ed25519Pair(person.seed)
    const certificate = await x509.X509CertificateGenerator.create({
      serialNumber: person.serial,
      subject: new x509.Name([{ CN: [person.name] }, { '0.9.2342.19200300.100.1.1': [person.subjectId] }]),
      issuer: this.certificate.subject,
      notBefore: this.start,
      notAfter: years(this.start, 3),
      signingAlgorithm: { name: 'Ed25519' },
      signingKey: this.keys.privateKey,
      publicKey,
      extensions: [
        new x509.KeyUsagesExtension(
          x509.KeyUsageFlags.digitalSignature | x509.KeyUsageFlags.nonRepudiation,
          true,
        ),
      ],
    })
    return issued(certificate)
  }

  async revocationList(at: Date, revoked: { serial: string; time: Date }[] = []): Promise<string> {
    const crl = await x509.X509CrlGenerator.create({
      issuer: this.certificate.subject,
      thisUpdate: at,
      nextUpdate: years(at, 1),
      signingAlgorithm: { name: 'Ed25519' },
      signingKey: this.keys.privateKey,
      entries: revoked.map(({ serial, time }) => ({ serialNumber: serial, revocationDate: time })),
    })
    // The package's own toString labels a list CRL; RFC 7468 section 7 and OpenSSL call it X509 CRL.
    return `${x509.PemConverter.encode(crl.rawData, 'X509 CRL')}\n`
  }
}

function years(from: Date, count: number): Date {
  return new Date(Date.UTC(from.getUTCFullYear() + count, from.getUTCMonth(), from.getUTCDate()))
}

const ecdsa = { name: 'ECDSA', namedCurve: 'P-256', hash: 'SHA-256' }

/** An RFC 3161 authority: a root and a signer on P-256. */
export class TimeStampAuthority {
  private serial = 0

  private constructor(
    private readonly signerKeys: CryptoKeyPair,
    private readonly signer: x509.X509Certificate,
    private readonly rootCertificate: x509.X509Certificate,
  ) {}

  static async open(name: string, start: Date, signerYears = 10): Promise<TimeStampAuthority> {
    const [rootKeys, signerKeys] = await Promise.all(
      [0, 1].map(() => subtle.generateKey(ecdsa, true, ['sign', 'verify'])),
    )
    if (!rootKeys || !signerKeys) throw new Error('no keys')
    const root = await x509.X509CertificateGenerator.createSelfSigned({
      serialNumber: '01',
      name: `CN=${name} root`,
      notBefore: start,
      notAfter: years(start, 20),
      signingAlgorithm: ecdsa,
      keys: rootKeys as CryptoKeyPair,
      extensions: [
        new x509.BasicConstraintsExtension(true, undefined, true),
        new x509.KeyUsagesExtension(x509.KeyUsageFlags.keyCertSign, true),
      ],
    })
    const signer = await x509.X509CertificateGenerator.create({
      serialNumber: '02',
      subject: `CN=${name}`,
      issuer: root.subject,
      notBefore: start,
      notAfter: years(start, signerYears),
      signingAlgorithm: ecdsa,
      signingKey: (rootKeys as CryptoKeyPair).privateKey,
      publicKey: (signerKeys as CryptoKeyPair).publicKey,
      extensions: [
        new x509.ExtendedKeyUsageExtension(['1.3.6.1.5.5.7.3.8'], true),
        new x509.KeyUsagesExtension(x509.KeyUsageFlags.digitalSignature, true),
      ],
    })
    return new TimeStampAuthority(signerKeys as CryptoKeyPair, signer, root)
  }

  get root(): IssuedCertificate {
    return issued(this.rootCertificate)
  }

  /** TimeStampResp (DER) over data, at a time. */
  async stamp(data: Uint8Array, at: Date): Promise<Uint8Array> {
    const info = new pkijs.TSTInfo({
      version: 1,
      policy: '1.2.3.4.1',
      messageImprint: await pkijs.MessageImprint.create('SHA-256', data.slice()),
      serialNumber: new asn1js.Integer({ value: ++this.serial }),
      genTime: new Date(Math.floor(at.getTime() / 1000) * 1000),
    })
    const content = new Uint8Array(info.toSchema().toBER())
    const signer = pkijs.Certificate.fromBER(this.signer.rawData)
    const signed = new pkijs.SignedData({
      version: 3,
      encapContentInfo: new pkijs.EncapsulatedContentInfo({
        eContentType: '1.2.840.113549.1.9.16.1.4',
        eContent: new asn1js.OctetString({ valueHex: content.slice().buffer }),
      }),
      signerInfos: [
        new pkijs.SignerInfo({
          version: 1,
          sid: new pkijs.IssuerAndSerialNumber({ issuer: signer.issuer, serialNumber: signer.serialNumber }),
          signedAttrs: new pkijs.SignedAndUnsignedAttributes({
            type: 0,
            attributes: await this.attributes(content),
          }),
        }),
      ],
      certificates: [signer],
    })
    await signed.sign(this.signerKeys.privateKey, 0, 'SHA-256', content.slice().buffer)
    const token = new pkijs.ContentInfo({
      contentType: pkijs.ContentInfo.SIGNED_DATA,
      content: signed.toSchema(true),
    })
    const response = new pkijs.TimeStampResp({
      status: new pkijs.PKIStatusInfo({ status: 0 }),
      timeStampToken: token,
    })
    return new Uint8Array(response.toSchema().toBER())
  }

  private async attributes(content: Uint8Array): Promise<pkijs.Attribute[]> {
    const digest = (bytes: BufferSource) => subtle.digest('SHA-256', bytes)
    const certificateId = new asn1js.Sequence({
      value: [new asn1js.OctetString({ valueHex: await digest(this.signer.rawData) })],
    })
    const certificates = new asn1js.Sequence({ value: [new asn1js.Sequence({ value: [certificateId] })] })
    const messageDigest = new asn1js.OctetString({ valueHex: await digest(content.slice()) })
    return [
      new pkijs.Attribute({
        type: '1.2.840.113549.1.9.3',
        values: [new asn1js.ObjectIdentifier({ value: '1.2.840.113549.1.9.16.1.4' })],
      }),
      new pkijs.Attribute({ type: '1.2.840.113549.1.9.4', values: [messageDigest] }),
      new pkijs.Attribute({ type: '1.2.840.113549.1.9.16.2.47', values: [certificates] }),
    ]
  }
}
