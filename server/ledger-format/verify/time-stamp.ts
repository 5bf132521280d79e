import { fromBER, OctetString, Sequence, type AsnType } from 'asn1js'
import {
  ContentInfo,
  IssuerAndSerialNumber,
  SignedData,
  TimeStampResp,
  TSTInfo,
  type Attribute,
  type SignerInfo,
} from 'pkijs'
import { sha1 } from '@noble/hashes/legacy.js'
import { sha256 } from '@noble/hashes/sha2.js'
import { sameBytes } from '../bytes.ts'
import { toHex } from '../digest.ts'
import { checkDer } from './der.ts'
import { need, Wrong } from './report.ts'
import { checkPath, keyUsageBit, oid, readCertificate, type Certificate } from './x509.ts'
import { digestAlgorithms, signatureHolds } from './x509-signature.ts'

const tstInfoType = '1.2.840.113549.1.9.16.1.4'
const attribute = {
  contentType: '1.2.840.113549.1.9.3',
  messageDigest: '1.2.840.113549.1.9.4',
  signingCertificate: '1.2.840.113549.1.9.16.2.12',
  signingCertificateV2: '1.2.840.113549.1.9.16.2.47',
} as const

export interface TimeStamp {
  /** genTime: when the authority stamped. */
  time: Date
  signer: Certificate
}

/**
 * Checks an RFC 3161 response over `data` as `openssl ts -verify -attime <genTime>` does: granted, digest of the data, signed
 * attributes, signer's certificate inside the token, its purpose and its path to one of `authorities` at genTime.
 * @param authorities certificates of tsa-chain.pem
 * @throws Wrong that says what does not hold.
 */
export function checkTimeStamp(
  data: Uint8Array,
  response: Uint8Array,
  authorities: readonly Certificate[],
): TimeStamp {
  const signed = readToken(response)
  const content = signed.encapContentInfo
  need(content.eContentType === tstInfoType && content.eContent !== undefined, 'time stamp holds no time')
  const tst = new Uint8Array(content.eContent.getValue())
  checkDer(tst)
  const info = TSTInfo.fromBER(tst)
  const imprint = digestAlgorithms[info.messageImprint.hashAlgorithm.algorithmId]
  if (!imprint) throw new Wrong('time stamp uses a weak digest')
  need(
    sameBytes(imprint.hash(data), info.messageImprint.hashedMessage.valueBlock.valueHexView),
    'time stamp is of other data',
  )
  const [signerInfo, ...more] = signed.signerInfos
  if (!signerInfo || more.length > 0) throw new Wrong('time stamp has not one signer')
  const certificates = embeddedCertificates(response)
  const signer = certificates.find((certificate) => isNamed(signerInfo, certificate))
  if (!signer) throw new Wrong('the signer’s certificate is not in the time stamp')
  checkSignature(signerInfo, signer, tst)
  checkPurpose(signer)
  checkPath(signer, certificates, authorities, info.genTime)
  return { time: info.genTime, signer }
}

function readToken(response: Uint8Array): SignedData {
  checkDer(response)
  const answer = TimeStampResp.fromBER(response.slice())
  need(answer.status.status === 0 || answer.status.status === 1, 'time stamp was not granted')
  const token: ContentInfo | undefined = answer.timeStampToken
  if (token?.contentType !== ContentInfo.SIGNED_DATA) throw new Wrong('time stamp holds no signed data')
  return new SignedData({ schema: token.content })
}

/** Certificates of the token, from its own bytes: writing them anew could mend what is damaged. */
function embeddedCertificates(response: Uint8Array): Certificate[] {
  const { result } = fromBER(response.slice())
  const token = childOf(result, 1)
  const signedData = childOf(childOf(token, 1), 0)
  const set = childrenOf(signedData).find(
    (item) => item.idBlock.tagClass === 3 && item.idBlock.tagNumber === 0,
  )
  return childrenOf(set)
    .filter((item) => item.idBlock.tagClass === 1 && item.idBlock.tagNumber === 16)
    .map((item) => readCertificate(item.valueBeforeDecodeView.slice()))
}

function childrenOf(value: AsnType | undefined): AsnType[] {
  const children: unknown = (value?.valueBlock as { value?: unknown } | undefined)?.value
  return Array.isArray(children) ? (children as AsnType[]) : []
}

function childOf(value: AsnType | undefined, index: number): AsnType | undefined {
  return childrenOf(value)[index]
}

function isNamed(info: SignerInfo, certificate: Certificate): boolean {
  if (info.sid instanceof IssuerAndSerialNumber) {
    const issuer = new Uint8Array(info.sid.issuer.toSchema().toBER())
    return (
      sameBytes(issuer, certificate.issuer) &&
      toHex(info.sid.serialNumber.valueBlock.valueHexView) === certificate.serial
    )
  }
  const identifier = (info.sid as { valueBlock?: { valueHexView?: Uint8Array } }).valueBlock?.valueHexView
  return (
    identifier !== undefined &&
    certificate.subjectKeyIdentifier !== null &&
    sameBytes(identifier, certificate.subjectKeyIdentifier)
  )
}

/** RFC 5652 section 5.4 and 5.6: the attributes are signed, and they hold the digest of the content. */
function checkSignature(info: SignerInfo, signer: Certificate, content: Uint8Array): void {
  const digest = digestAlgorithms[info.digestAlgorithm.algorithmId]
  if (!digest) throw new Wrong('time stamp is signed over a weak digest')
  if (!info.signedAttrs) throw new Wrong('time stamp has no signed attributes')
  const find = (type: string) => info.signedAttrs?.attributes.find((item) => item.type === type)
  const contentType: unknown = find(attribute.contentType)?.values[0]
  const type = (contentType as { valueBlock?: { toString(): string } } | undefined)?.valueBlock?.toString()
  need(type === tstInfoType, 'signed attributes are for other content')
  const messageDigest: unknown = find(attribute.messageDigest)?.values[0]
  need(
    messageDigest instanceof OctetString &&
      sameBytes(messageDigest.valueBlock.valueHexView, digest.hash(content)),
    'message digest mismatch',
  )
  const holds = signatureHolds(
    signer.key,
    info.signatureAlgorithm.algorithmId,
    new Uint8Array(info.signedAttrs.encodedValue),
    info.signature.valueBlock.valueHexView,
    info.digestAlgorithm.algorithmId,
  )
  need(holds, 'signature of the time stamp does not verify')
  need(
    namesSigner(find(attribute.signingCertificateV2) ?? find(attribute.signingCertificate), signer),
    'time stamp names another certificate of its signer',
  )
}

/** RFC 5816: the first certificate identifier among the signed attributes is the digest of the signer's certificate. */
function namesSigner(item: Attribute | undefined, signer: Certificate): boolean {
  const identifier = firstChild(firstChild(item?.values[0]))
  const parts: unknown[] = identifier instanceof Sequence ? identifier.valueBlock.value : []
  const hash = parts.find((part) => part instanceof OctetString)
  if (!item || !hash) return false
  const named = parts[0] instanceof Sequence ? objectIdentifierIn(parts[0]) : null
  const digest =
    item.type === attribute.signingCertificate
      ? sha1
      : named === null
        ? sha256
        : digestAlgorithms[named]?.hash
  return digest !== undefined && sameBytes(digest(signer.der), hash.valueBlock.valueHexView)
}

function firstChild(value: unknown): unknown {
  return value instanceof Sequence ? value.valueBlock.value[0] : undefined
}

function objectIdentifierIn(sequence: Sequence): string | null {
  const first: unknown = sequence.valueBlock.value[0]
  return (first as { valueBlock?: { toString(): string } } | undefined)?.valueBlock?.toString() ?? null
}

/** RFC 3161 section 2.3: the key is for time stamping alone, and says so in a critical extension. */
function checkPurpose({ extendedUsage, keyUsage }: Certificate): void {
  const only = extendedUsage?.purposes.length === 1 && extendedUsage.purposes[0] === oid.timeStamping
  need(only && extendedUsage.critical, 'the signer’s certificate is not for time stamping alone')
  const signs = [keyUsageBit.digitalSignature, keyUsageBit.contentCommitment]
  need(!keyUsage || signs.some((bit) => keyUsage.bits.has(bit)), 'the signer’s key is not for signatures')
}
