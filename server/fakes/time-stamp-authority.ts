import 'reflect-metadata'
import { createHash, randomBytes, webcrypto } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { createServer, type Server } from 'node:http'
import path from 'node:path'
import * as x509 from '@peculiar/x509'
import * as asn1js from 'asn1js'
import * as pkijs from 'pkijs'

/*
 * A time-stamp authority of RFC 3161 on this machine, for demonstration, development and tests: same protocol as a real
 * one, own root (ECDSA P-256, since Ed25519 fails in CMS with OpenSSL 3.0). It proves nothing to outsiders.
 */

export interface TimeStampAuthority {
  /** DER of the answer to a DER request; a refusal has its status inside, as the protocol wants. */
  respond(requestDer: Uint8Array): Promise<Uint8Array>
  /** PEM file with signer and root. */
  chainFile: string
}

const algorithm = { name: 'ECDSA', namedCurve: 'P-256', hash: 'SHA-256' }
const oids = {
  timeStamping: '1.3.6.1.5.5.7.3.8',
  tstInfo: '1.2.840.113549.1.9.16.1.4',
  contentType: '1.2.840.113549.1.9.3',
  messageDigest: '1.2.840.113549.1.9.4',
  signingCertificateV2: '1.2.840.113549.1.9.16.2.47',
  sha256: '2.16.840.1.101.3.4.2.1',
  // An arc for documentation and tests: the local policy says only "by the laboratory's own authority".
  policy: '2.999.4310.1',
}
const year = 365.25 * 86_400_000

x509.cryptoProvider.set(webcrypto as Crypto)
pkijs.setEngine('node', new pkijs.CryptoEngine({ name: 'node', crypto: webcrypto as Crypto }))

interface Signer {
  key: CryptoKey
  certificate: pkijs.Certificate
  der: Uint8Array
}

/**
 * Opens the authority whose keys lie in `folder`, making them the first time; writes `tsa-chain.pem` there. The clock may be
 * injected, so that a demonstration can be seeded in the past.
 */
export async function createTimeStampAuthority(given: {
  folder: string
  clock: { now(): Date }
}): Promise<TimeStampAuthority> {
  const chainFile = path.join(given.folder, 'tsa-chain.pem')
  if (!existsSync(chainFile)) await makeKeys(given.folder, given.clock.now())
  const signer = await loadSigner(given.folder)
  return {
    chainFile,
    async respond(requestDer) {
      const request = readRequest(requestDer)
      if (!request) return refusal('badDataFormat: the request is not a TimeStampReq over SHA-256')
      const info = timeStampInfo(request, given.clock.now())
      const content = await sign(info, signer, request.certReq === true)
      return der(
        new pkijs.TimeStampResp({ status: new pkijs.PKIStatusInfo({ status: 0 }), timeStampToken: content }),
      )
    },
  }
}

/** Serves the authority by HTTP on a loopback port (0: a free one). */
export async function serveTimeStampAuthority(authority: TimeStampAuthority, port = 0): Promise<Server> {
  const server = createServer((request, response) => {
    const parts: Buffer[] = []
    request.on('data', (part: Buffer) => parts.push(part))
    request.on('end', () => {
      if (request.method !== 'POST' || request.headers['content-type'] !== 'application/timestamp-query') {
        response.writeHead(415).end('POST an application/timestamp-query.\n')
        return
      }
      authority.respond(Buffer.concat(parts)).then(
        (answer) => response.writeHead(200, { 'content-type': 'application/timestamp-reply' }).end(answer),
        (error: Error) => response.writeHead(500).end(`${error.message}\n`),
      )
    })
  })
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve))
  return server
}

async function makeKeys(folder: string, now: Date): Promise<void> {
  mkdirSync(folder, { recursive: true })
  // The dates begin well before now, so that a demonstration seeded in the past has valid stamps.
  const begin = new Date(now.getTime() - 2 * year)
  const [rootKeys, signerKeys] = await Promise.all([newKeys(), newKeys()])
  const root = await x509.X509CertificateGenerator.createSelfSigned({
    serialNumber: serial(),
    name: 'CN=Local time-stamp root',
    notBefore: begin,
    notAfter: new Date(begin.getTime() + 20 * year),
    signingAlgorithm: algorithm,
    keys: rootKeys,
    extensions: [
      new x509.BasicConstraintsExtension(true, 0, true),
      new x509.KeyUsagesExtension(x509.KeyUsageFlags.keyCertSign | x509.KeyUsageFlags.cRLSign, true),
    ],
  })
  const certificate = await x509.X509CertificateGenerator.create({
    serialNumber: serial(),
    subject: 'CN=Local time-stamp authority',
    issuer: root.subject,
    notBefore: begin,
    notAfter: new Date(begin.getTime() + 10 * year),
    signingKey: rootKeys.privateKey,
    publicKey: signerKeys.publicKey,
    signingAlgorithm: algorithm,
    extensions: [
      new x509.KeyUsagesExtension(x509.KeyUsageFlags.digitalSignature, true),
      new x509.ExtendedKeyUsageExtension([oids.timeStamping], true),
    ],
  })
  const pkcs8 = Buffer.from(await webcrypto.subtle.exportKey('pkcs8', signerKeys.privateKey))
  writeFileSync(path.join(folder, 'tsa-signer.key'), pkcs8, { mode: 0o600 })
  writeFileSync(path.join(folder, 'tsa-signer.der'), Buffer.from(certificate.rawData))
  writeFileSync(
    path.join(folder, 'tsa-chain.pem'),
    `${root.toString('pem')}\n${certificate.toString('pem')}\n`,
  )
}

const newKeys = () =>
  webcrypto.subtle.generateKey(algorithm, true, ['sign', 'verify']) as Promise<CryptoKeyPair>
// First bit clear: a serial number is positive.
const serial = () => Buffer.concat([Buffer.of(0x4a), randomBytes(15)]).toString('hex')

async function loadSigner(folder: string): Promise<Signer> {
  const der = readFileSync(path.join(folder, 'tsa-signer.der'))
  const pkcs8 = readFileSync(path.join(folder, 'tsa-signer.key'))
  const key = await webcrypto.subtle.importKey('pkcs8', pkcs8, algorithm, false, ['sign'])
  return { key: key as CryptoKey, certificate: pkijs.Certificate.fromBER(toBuffer(der)), der }
}

function readRequest(requestDer: Uint8Array): pkijs.TimeStampReq | null {
  try {
    const request = pkijs.TimeStampReq.fromBER(toBuffer(requestDer))
    const { hashAlgorithm, hashedMessage } = request.messageImprint
    return hashAlgorithm.algorithmId === oids.sha256 && hashedMessage.valueBlock.valueHexView.length === 32
      ? request
      : null
  } catch {
    return null
  }
}

function timeStampInfo(request: pkijs.TimeStampReq, now: Date): Uint8Array {
  const info = new pkijs.TSTInfo({
    version: 1,
    policy: request.reqPolicy ?? oids.policy,
    messageImprint: request.messageImprint,
    serialNumber: new asn1js.Integer({ valueHex: toBuffer(Buffer.from(serial(), 'hex')) }),
    // Whole seconds: the one form of the time that every reader prints alike.
    genTime: new Date(Math.floor(now.getTime() / 1000) * 1000),
    ordering: false,
    ...(request.nonce ? { nonce: request.nonce } : {}),
  })
  return der(info)
}

async function sign(info: Uint8Array, signer: Signer, withCertificate: boolean): Promise<pkijs.ContentInfo> {
  const signedData = new pkijs.SignedData({
    version: 3,
    encapContentInfo: new pkijs.EncapsulatedContentInfo({
      eContentType: oids.tstInfo,
      eContent: new asn1js.OctetString({ valueHex: toBuffer(info) }),
    }),
    signerInfos: [
      new pkijs.SignerInfo({
        version: 1,
        sid: new pkijs.IssuerAndSerialNumber({
          issuer: signer.certificate.issuer,
          serialNumber: signer.certificate.serialNumber,
        }),
        signedAttrs: new pkijs.SignedAndUnsignedAttributes({
          type: 0,
          attributes: signedAttributes(info, signer.der),
        }),
      }),
    ],
    ...(withCertificate ? { certificates: [signer.certificate] } : {}),
  })
  await signedData.sign(signer.key, 0, 'SHA-256')
  return new pkijs.ContentInfo({
    contentType: pkijs.ContentInfo.SIGNED_DATA,
    content: signedData.toSchema(true),
  })
}

/** Content type, digest of the content, and the digest that ties the signer's certificate to it (RFC 5816). */
function signedAttributes(info: Uint8Array, certificate: Uint8Array): pkijs.Attribute[] {
  const digestOf = (bytes: Uint8Array) =>
    new asn1js.OctetString({ valueHex: toBuffer(createHash('sha256').update(bytes).digest()) })
  const essCertificate = new asn1js.Sequence({ value: [digestOf(certificate)] })
  const attributes = [
    attribute(oids.contentType, new asn1js.ObjectIdentifier({ value: oids.tstInfo })),
    attribute(oids.messageDigest, digestOf(info)),
    attribute(
      oids.signingCertificateV2,
      new asn1js.Sequence({ value: [new asn1js.Sequence({ value: [essCertificate] })] }),
    ),
  ]
  // A SET OF stands in the order of its encodings.
  return attributes.sort((a, b) => Buffer.compare(der(a), der(b)))
}

const attribute = (type: string, value: asn1js.AsnType) => new pkijs.Attribute({ type, values: [value] })

function refusal(words: string): Uint8Array {
  const status = new pkijs.PKIStatusInfo({
    status: 2,
    statusStrings: [new asn1js.Utf8String({ value: words })],
  })
  return der(new pkijs.TimeStampResp({ status }))
}

function der(value: { toSchema(): asn1js.AsnType }): Uint8Array {
  return new Uint8Array(value.toSchema().toBER())
}

/** A copy with a buffer of its own: that of a Buffer may be a pool shared with other data. */
function toBuffer(bytes: Uint8Array): ArrayBuffer {
  return new Uint8Array(bytes).buffer
}
