import { sha256Hex, fromHex, toHex } from '../../ledger-format/digest.ts'
import { buildHead, headBytes } from '../../ledger-format/head.ts'
import { rootOfFrontier } from '../../ledger-format/merkle.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { lockLedger } from '../ledger/index.ts'
import { buildRevocationList } from './authority.ts'
import { laboratory } from './laboratory.ts'
import { certificateAuthority, ledgerKey } from './own-keys.ts'

type Needs = Pick<Services, 'db' | 'clock' | 'config' | 'queue' | 'mail'>

interface State {
  treeSize: string
  lastDigest: string
  lastAt: Date
  frontier: string[]
  epoch: string
}

/**
 * Signs a head over the ledger as it stands, in the caller's transaction and after its last event; keeps the revocation list
 * of that moment beside it and asks for a time stamp. Before the first manager enrolled there is no head: null.
 */
export async function makeHead(services: Needs, t: Transaction): Promise<{ treeSize: number } | null> {
  await lockLedger(services, t)
  const root = await services.db.row<{ id: string }>('select id from record.enrolments where root', {}, t)
  const state = await readState(services, t)
  if (!root || !state) return null
  const treeSize = Number(state.treeSize)
  const previous = await newestHead(services, t)
  if (previous?.treeSize === treeSize) return { treeSize }
  const key = await ledgerKey(services, t)
  const time = new Date(Math.max(services.clock.now().getTime(), state.lastAt.getTime()))
  const head = buildHead({
    laboratory: (await laboratory(services, t)).id,
    epoch: Number(state.epoch),
    treeSize,
    rootHash: toHex(rootOfFrontier({ size: treeSize, roots: state.frontier.map(fromHex) })),
    lastDigest: state.lastDigest,
    time: time.toISOString(),
    previous,
    keySha256: key.sha256,
  })
  const bytes = headBytes(head)
  const signature = key.sign(bytes)
  await services.db.run(
    `insert into record.heads (tree_size, head, signature, signature_sha256, root_hash, crl, made_at)
     values (:treeSize, :bytes, :signature, :signatureSha256, :rootHash, :crl, :time)`,
    {
      treeSize,
      bytes: Buffer.from(bytes),
      signature: Buffer.from(signature),
      signatureSha256: sha256Hex(signature),
      rootHash: head.rootHash,
      crl: await revocationList(services, time, t),
      time,
    },
    t,
  )
  await services.queue.send('stamp-head', { treeSize }, { transaction: t, retryLimit: 12 })
  if (!previous) await mailFirstHead(services, head.laboratory, t)
  return { treeSize }
}

function readState(services: Needs, t: Transaction): Promise<State | null> {
  return services.db.row<State>(
    `select s.tree_size as "treeSize", s.last_digest as "lastDigest", s.last_at as "lastAt", s.frontier,
       convert_from(e.canonical, 'UTF8')::jsonb ->> 'epoch' as epoch
     from record.ledger_state s join record.events e on e.sequence = s.tree_size`,
    {},
    t,
  )
}

async function newestHead(services: Needs, t: Transaction) {
  const row = await services.db.row<{ treeSize: string; rootHash: string }>(
    `select tree_size as "treeSize", root_hash as "rootHash" from record.heads order by tree_size desc limit 1`,
    {},
    t,
  )
  return row && { treeSize: Number(row.treeSize), rootHash: row.rootHash }
}

async function revocationList(services: Needs, now: Date, t: Transaction): Promise<string> {
  const revoked = await services.db.rows<{ serial: string; at: Date; reason: string }>(
    `select c.serial, r.revoked_at as at, r.reason
     from record.revocations r join record.certificates c on c.enrolment_id = r.enrolment_id order by c.serial`,
    {},
    t,
  )
  return buildRevocationList(await certificateAuthority(services, t), revoked, now)
}

/** The anchors go to the auditors apart from any bundle (rulings 5). */
async function mailFirstHead(services: Needs, laboratoryId: string, t: Transaction): Promise<void> {
  const auditors = await services.db.rows<{ email: string }>(
    `select email from work.people where active and email is not null and roles && array['auditor', 'manager']`,
    {},
    t,
  )
  for (const { email } of auditors) {
    const text =
      `The ledger of laboratory ${laboratoryId} has its first signed head.\n\n` +
      `Please keep a copy of its anchors away from this server: ${services.config.origin}/api/v1/ledger/anchors\n` +
      `They let you tell a true bundle from one that was rebuilt with other keys.\n`
    await services.mail.enqueue({ to: email, subject: 'Anchors of the ledger: please keep them', text }, t)
  }
}
