import { createHash, randomBytes, webcrypto } from 'node:crypto'
import * as asn1js from 'asn1js'
import * as pkijs from 'pkijs'

/*
 * Client of a time-stamp authority (RFC 3161): builds a request, and believes an answer only after its status, imprint,
 * nonce, signature and signer's chain were checked.
 */

export interface TimeStamp {
  /** The whole response, DER: what `timestamp.tsr` holds. */
  response: Uint8Array
  genTime: Date
  /** Common name of the signer. */
  authority: string
}

/** Carries a DER request to an authority and brings its DER answer. */
export type TimeStampTransport = (request: Uint8Array) => Promise<Uint8Array>

const oids = {
  sha256: '2.16.840.1.101.3.4.2.1',
  timeStamping: '1.3.6.1.5.5.7.3.8',
  extendedKeyUsage: '2.5.29.37',
  commonName: '2.5.4.3',
  signingCertificateV2: '1.2.840.113549.1.9.16.2.47',
}

/** Posts to an authority by HTTP; gives up after `timeoutMs`. */
export function httpTransport(url: string, timeoutMs: number): TimeStampTransport {
  return async (request) => {
    const answer = await fetch(url, {
      method: 'POST',
      headers: { 'content-type': 'application/timestamp-query' },
      body: new Uint8Array(request),
      signal: AbortSignal.timeout(timeoutMs),
      redirect: 'error',
    })
    if (!answer.ok) throw new Error(`The time-stamp authority answered ${answer.status}.`)
    return new Uint8Array(await answer.arrayBuffer())
  }
}

/**
 * A time stamp over `data`, checked.
 * @param chainPem certificates of the authority, its root among them
 * @throws Error that says which check failed
 */
export async function requestTimeStamp(
  data: Uint8Array,
  transport: TimeStampTransport,
  chainPem: string,
): Promise<TimeStamp> {
  const nonce = randomBytes(8)
  nonce[0] = (nonce[0]! & 0x3f) | 0x40
  const response = await transport(buildRequest(sha256(data), nonce))
  return checkResponse(response, data, chainPem, nonce)
}

function buildRequest(imprint: Uint8Array, nonce: Uint8Array): Uint8Array {
  const request = new pkijs.TimeStampReq({
    version: 1,
    messageImprint: new pkijs.MessageImprint({
      hashAlgorithm: new pkijs.AlgorithmIdentifier({
        algorithmId: oids.sha256,
        algorithmParams: new asn1js.Null(),
      }),
      hashedMessage: new asn1js.OctetString({ valueHex: ownBuffer(imprint) }),
    }),
    nonce: new asn1js.Integer({ valueHex: ownBuffer(nonce) }),
    certReq: true,
  })
  return new Uint8Array(request.toSchema().toBER())
}

/** Checks a response over `data`; the nonce is compared when one is given. */
async function checkResponse(
  response: Uint8Array,
  data: Uint8Array,
  chainPem: string,
  nonce?: Uint8Array,
): Promise<TimeStamp> {
  const parsed = pkijs.TimeStampResp.fromBER(ownBuffer(response))
  const { status } = parsed.status
  if (status !== 0 && status !== 1) throw new Error(`The time-stamp authority refused: status ${status}.`)
  if (!parsed.timeStampToken) throw new Error('The answer of the time-stamp authority holds no token.')
  const signedData = new pkijs.SignedData({ schema: parsed.timeStampToken.content })
  const info = readInfo(signedData)
  if (!same(info.messageImprint.hashedMessage.valueBlock.valueHexView, sha256(data)))
    throw new Error('The time stamp is over something else.')
  if (nonce && !(info.nonce && same(info.nonce.valueBlock.valueHexView, nonce)))
    throw new Error('The time stamp answers another request.')
  const authority = await checkSigner(signedData, data, certificatesIn(chainPem), info.genTime)
  return { response, genTime: info.genTime, authority }
}

function readInfo(signedData: pkijs.SignedData): pkijs.TSTInfo {
  const { eContent } = signedData.encapContentInfo
  if (!eContent) throw new Error('The time stamp has no content.')
  const info = pkijs.TSTInfo.fromBER(eContent.getValue())
  if (info.messageImprint.hashAlgorithm.algorithmId !== oids.sha256)
    throw new Error('The time stamp is not over SHA-256.')
  return info
}

/** Signature and chain at the time of the stamp; the signer must be certified for time stamps and nothing else. */
async function checkSigner(
  signedData: pkijs.SignedData,
  data: Uint8Array,
  chain: pkijs.Certificate[],
  at: Date,
): Promise<string> {
  signedData.certificates = [...(signedData.certificates ?? []), ...chain]
  const roots = chain.filter((certificate) => certificate.issuer.isEqual(certificate.subject))
  if (roots.length === 0) throw new Error('The certificates of the time-stamp authority hold no root.')
  const result = await signedData
    .verify({
      signer: 0,
      data: ownBuffer(data),
      trustedCerts: roots,
      checkDate: at,
      checkChain: true,
      extendedMode: true,
    })
    .catch((error: { message?: string }) => ({
      signatureVerified: false,
      signerCertificateVerified: false,
      signerCertificate: null,
      message: error.message,
    }))
  if (!result.signatureVerified || !result.signerCertificateVerified || !result.signerCertificate)
    throw new Error(
      `The time stamp does not verify against the authority's certificates: ${result.message ?? 'unknown reason'}`,
    )
  const usage = result.signerCertificate.extensions?.find(
    (extension) => extension.extnID === oids.extendedKeyUsage,
  )
  const purposes = (usage?.parsedValue as pkijs.ExtKeyUsage | undefined)?.keyPurposes
  if (!usage?.critical || purposes?.length !== 1 || purposes[0] !== oids.timeStamping)
    throw new Error('The signer of the time stamp is not certified for time stamps alone.')
  if (!namesCertificate(signedData, result.signerCertificate))
    throw new Error('The time stamp does not name the certificate of its signer.')
  const name = result.signerCertificate.subject.typesAndValues.find((item) => item.type === oids.commonName)
  return String(name?.value.valueBlock.value ?? 'unnamed authority')
}

/** The signed attribute of RFC 5816 must hold the digest of the signer's certificate: readers such as OpenSSL demand it. */
function namesCertificate(signedData: pkijs.SignedData, certificate: pkijs.Certificate): boolean {
  const attributes = signedData.signerInfos[0]?.signedAttrs?.attributes ?? []
  const attribute = attributes.find(({ type }) => type === oids.signingCertificateV2)
  const digest = sha256(new Uint8Array(certificate.toSchema().toBER()))
  return attribute !== undefined && Buffer.from(attribute.toSchema().toBER()).includes(digest)
}

/** Certificates of a PEM file. */
function certificatesIn(pem: string): pkijs.Certificate[] {
  return pemBlocks(pem).map((der) => pkijs.Certificate.fromBER(ownBuffer(der)))
}

/** SHA-256 (hex) of each self-issued certificate in a PEM file, sorted. */
export function rootDigests(pem: string): string[] {
  return pemBlocks(pem)
    .filter((der) => {
      const certificate = pkijs.Certificate.fromBER(ownBuffer(der))
      return certificate.issuer.isEqual(certificate.subject)
    })
    .map((der) => createHash('sha256').update(der).digest('hex'))
    .sort()
}

function pemBlocks(pem: string): Buffer[] {
  const blocks = pem.match(/-----BEGIN CERTIFICATE-----[^-]+-----END CERTIFICATE-----/g) ?? []
  return blocks.map((block) => Buffer.from(block.replace(/-----[A-Z ]+-----/g, ''), 'base64'))
}

const sha256 = (data: Uint8Array) => createHash('sha256').update(data).digest()
const same = (a: Uint8Array, b: Uint8Array) => Buffer.compare(a, b) === 0
// The buffer behind a Buffer may be a pool shared with other data.
const ownBuffer = (bytes: Uint8Array) => new Uint8Array(bytes).buffer

pkijs.setEngine('node', new pkijs.CryptoEngine({ name: 'node', crypto: webcrypto as Crypto }))
