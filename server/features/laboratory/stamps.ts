import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import { httpTransport, requestTimeStamp, rootDigests } from '../../platform/timestamps/time-stamp.ts'
import { appendEvent, systemActor } from '../ledger/index.ts'
import { laboratory } from './laboratory.ts'

type Needs = Pick<Services, 'db' | 'clock' | 'config' | 'log' | 'timeStamps'>

const JOB_TIMEOUT_MS = 30_000
/** A stamp whose time is further from ours than this is kept, but told (threat B4). */
const CLOCK_ALARM_MS = 60_000

/** SHA-256 of signature bytes, hex: the key of their time stamp. */
const signatureDigest = (signature: Uint8Array) => createHash('sha256').update(signature).digest('hex')

/** Stamps a signature unless it has a stamp; throws while the authority cannot be reached or answers wrongly. */
export async function stamp(
  services: Needs,
  signature: Uint8Array,
  timeoutMs = JOB_TIMEOUT_MS,
): Promise<void> {
  const signatureSha256 = signatureDigest(signature)
  const { url, chainFile, independent } = services.config.timeStamps
  const found = await services.db.row(
    'select 1 as one from record.time_stamps where signature_sha256 = :signatureSha256',
    { signatureSha256 },
  )
  if (found) return
  const transport = services.timeStamps ?? httpTransport(url, timeoutMs)
  const { response, genTime, authority } = await requestTimeStamp(
    signature,
    transport,
    readFileSync(chainFile, 'utf8'),
  )
  const now = services.clock.now()
  const apart = Math.abs(genTime.getTime() - now.getTime())
  if (apart > CLOCK_ALARM_MS)
    services.log.error({ apartMs: apart }, 'the time-stamp authority and this server disagree about the time')
  await services.db.run(
    `insert into record.time_stamps (signature_sha256, token, gen_time, authority, independent, stamped_at)
     values (:signatureSha256, :token, :genTime, :authority, :independent, :now) on conflict do nothing`,
    { signatureSha256, token: Buffer.from(response), genTime, authority, independent, now },
  )
}

/** Signatures of entries and heads that have no time stamp yet, oldest first. */
function unstamped(services: Needs) {
  return services.db.rows<{ signature: Buffer }>(
    `select s.signature from (
       select signature, signature_sha256, signed_at as at from record.signatures
       union all select signature, signature_sha256, made_at from record.heads) s
     where not exists (select 1 from record.time_stamps t where t.signature_sha256 = s.signature_sha256)
     order by s.at limit 1000`,
  )
}

/** Catches up with every stamp that is missing; stops at the first that fails. */
export async function stampAllMissing(services: Needs): Promise<void> {
  for (const { signature } of await unstamped(services)) await stamp(services, signature)
}

/** A new authority's root enters the ledger and the anchors before its first stamp is used. */
export async function registerTimeStampRoots(services: Needs): Promise<void> {
  const chain = readFileSync(services.config.timeStamps.chainFile, 'utf8')
  const { id } = await laboratory(services)
  for (const sha256 of rootDigests(chain)) {
    await services.db.transaction(async (t) => {
      const added = await services.db.run(
        `insert into record.tsa_roots (sha256, chain, since) values (:sha256, :chain, :now) on conflict do nothing`,
        { sha256, chain, now: services.clock.now() },
        t,
      )
      if (added === 0) return
      const payload = { tsaRootSha256: sha256 }
      await appendEvent(services, t, {
        actor: systemActor,
        action: 'ledger.tsa-added',
        subject: { kind: 'laboratory', id },
        payload,
      })
    })
  }
}

/** The jobs that stamp a signature of an entry and a head when the attempt right after the commit failed. */
export function stampJobs(services: Needs): Job[] {
  return [
    job('stamp-signature', z.object({ signatureId: z.uuid() }), async ({ signatureId }) => {
      const row = await services.db.row<{ signature: Buffer }>(
        'select signature from record.signatures where id = :signatureId',
        { signatureId },
      )
      if (row) await stamp(services, row.signature)
    }),
    job('stamp-head', z.object({ treeSize: z.int() }), async ({ treeSize }) => {
      const row = await services.db.row<{ signature: Buffer }>(
        'select signature from record.heads where tree_size = :treeSize',
        { treeSize },
      )
      if (row) await stamp(services, row.signature)
    }),
  ]
}
