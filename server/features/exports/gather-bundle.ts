import { existsSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import type {
  BundleInput,
  BundleScope,
  EntryInput,
  SignatureInput,
} from '../../ledger-format/bundle/index.ts'
import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import type { Rotation } from '../../ledger-format/rotation.ts'
import type { Services } from '../../platform/services.ts'
import { entryNumber } from '../entries/index.ts'
import { renditionsOf } from '../evidence/index.ts'
import { filesOfEntry } from '../files/index.ts'
import { keyInputs } from '../keys/index.ts'
import { laboratory, ledgerKey } from '../laboratory/index.ts'
import { anchors, findHead, ledgerKeys, merkleTree } from '../ledger/index.ts'
import { release, signaturesOf, type SignatureRow } from '../signatures/index.ts'
import type { Chosen, ChosenEntry } from './choose-entries.ts'

const checkerFile = new URL('../../../dist/check.html', import.meta.url)

/** Everything of a bundle but the raw bytes. */
export async function gatherBundle(
  services: Services,
  chosen: Chosen,
  scope: BundleScope,
  withoutRaw: boolean,
): Promise<BundleInput> {
  const home = await laboratory(services)
  const head = await findHead(services, chosen.treeSize)
  const given = await anchors(services)
  if (!head || !given) throw new Error(`The head of ${chosen.treeSize} events is missing.`)
  const keys = await ledgerKeys(services)
  const signer = await ledgerKey(services)
  const entries: EntryInput[] = []
  for (const entry of chosen.entries) entries.push(await entryInput(services, entry, withoutRaw))
  return {
    laboratory: { id: home.id, name: home.name },
    release,
    scope,
    head: head.head,
    headSignature: head.signature,
    headTimeStamp: head.timeStamp,
    tree: await merkleTree(services),
    anchors: given,
    rotations: keys.flatMap(({ rotation }) =>
      rotation ? [parseCanonical(rotation) as unknown as Rotation] : [],
    ),
    ledgerKeys: keys.map(({ publicKey }) => publicKey),
    pki: { caPem: home.caCertificate, crlPem: head.crl, tsaChainPem: await timeStampChain(services) },
    keys: await keyInputs(services),
    entries,
    leftOut: chosen.leftOut,
    checkerHtml: checkerHtml(),
    sign: (bytes) => signer.sign(bytes),
  }
}

async function entryInput(
  services: Services,
  { entry, events }: ChosenEntry,
  withoutRaw: boolean,
): Promise<EntryInput> {
  const { db, storage } = services
  const signatures = await signaturesOf(db, [entry.id])
  const rendered: EntryInput['rendered'] = []
  for (const { path, objectKey, objectVersion } of await renditionsOf(db, entry.id))
    rendered.push({ name: path, bytes: await storage.getBytes(objectKey, objectVersion) })
  const files = await filesOfEntry(db, entry.id)
  return {
    entryId: entry.id,
    number: entryNumber(entry),
    signatures: await signatureInputs(
      services,
      signatures.filter(({ voidedAt }) => voidedAt === null),
    ),
    voided: await signatureInputs(
      services,
      signatures.filter(({ voidedAt }) => voidedAt !== null),
    ),
    rendered,
    files: files.map(({ id, name, size, sha256, sha512 }) => ({
      id,
      name,
      size,
      sha256,
      sha512,
      leftOut: withoutRaw,
    })),
    events,
  }
}

async function signatureInputs(services: Services, rows: SignatureRow[]): Promise<SignatureInput[]> {
  const inputs: SignatureInput[] = []
  for (const { record, signature, certificateSha256, signatureSha256 } of rows) {
    const found = await services.db.row<{ pem: string; token: Buffer | null }>(
      `select c.pem, (select t.token from record.time_stamps t where t.signature_sha256 = :signatureSha256) as token
       from record.certificates c where c.sha256 = :certificateSha256`,
      { certificateSha256, signatureSha256 },
    )
    if (!found) throw new Error(`The certificate ${certificateSha256} is missing.`)
    inputs.push({ record, signature, certificatePem: found.pem, timeStamp: found.token })
  }
  return inputs
}

/** Certificates of every time-stamp authority ever used, each once, the newest authority's first. */
async function timeStampChain(services: Services): Promise<string> {
  const rows = await services.db.rows<{ chain: string }>(
    'select chain from record.tsa_roots order by since desc',
  )
  const blocks = rows.flatMap(
    ({ chain }) => chain.match(/-----BEGIN CERTIFICATE-----[^-]+-----END CERTIFICATE-----/g) ?? [],
  )
  return `${[...new Set(blocks.map((block) => block.replace(/\s+$/gm, '')))].join('\n')}\n`
}

function checkerHtml(): Buffer {
  if (!existsSync(fileURLToPath(checkerFile)))
    throw new Error('dist/check.html is missing: run `npm run build` first.')
  return readFileSync(checkerFile)
}
