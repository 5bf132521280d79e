import type { z } from 'zod'
import type { signedHeadSchema, verificationSchema } from '../../contract/ledger.ts'
import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import { ChainChecker } from '../../ledger-format/chain.ts'
import { verifySignature } from '../../ledger-format/ed25519.ts'
import { headBytes } from '../../ledger-format/head.ts'
import type { LedgerEvent } from '../../ledger-format/event.ts'
import type { Services } from '../../platform/services.ts'
import { allHeads, ledgerKeys } from './heads.ts'

type Verification = z.infer<typeof verificationSchema>
type GivenHead = z.infer<typeof signedHeadSchema>
type Broken = Verification['firstBroken']

const BATCH = 2000

interface Row {
  sequence: string
  at: Date
  action: string
  subjectKind: string
  subjectId: string
  subjectSequence: string
  canonical: Buffer
  digest: string
  leafHash: string
}

/**
 * Recomputes the whole ledger from its rows: canonical bytes, digests, the chain, the chain of each subject, the columns
 * beside them, the tree, and the root and signature of every head; names the first event that does not hold. A head from
 * elsewhere, for example from a mail, is compared with the history recomputed.
 */
export async function verifyLedger(
  services: Pick<Services, 'db' | 'clock'>,
  given?: GivenHead,
): Promise<Verification> {
  const started = Date.now()
  const heads = await allHeads(services)
  const sizes = new Set(heads.map(({ head }) => head.treeSize))
  if (given) sizes.add(given.head.treeSize)
  const checker = new ChainChecker(sizes)
  const broken =
    (await checkRows(services, checker)) ??
    (await checkState(services, checker)) ??
    (await checkHeads(services, heads, checker))
  const { treeSize, rootHash } = checker.result()
  const head = given
    ? await compareHead(services, given, checker, treeSize)
    : heads.length > 0
      ? 'not-given'
      : 'none'
  const holds = broken === null && head !== 'differs'
  return {
    holds,
    events: treeSize,
    firstBroken: broken,
    rootHash: broken ? null : rootHash,
    head,
    checkedAt: services.clock.now().toISOString(),
    durationS: (Date.now() - started) / 1000,
    detail: sentence(broken, head, treeSize, heads.length),
  }
}

async function checkRows(services: Pick<Services, 'db'>, checker: ChainChecker): Promise<Broken> {
  for (let after = 0; ;) {
    const rows = await services.db.rows<Row>(
      `select sequence, at, action, subject_kind as "subjectKind", subject_id as "subjectId",
         subject_sequence as "subjectSequence", canonical, digest, leaf_hash as "leafHash"
       from record.events where sequence > :after order by sequence limit ${BATCH}`,
      { after },
    )
    for (const row of rows) {
      const problem = checkRow(row, checker)
      if (problem !== null)
        return { sequence: checker.result().firstBroken?.sequence ?? Number(row.sequence), detail: problem }
    }
    if (rows.length < BATCH) return null
    after = Number(rows.at(-1)?.sequence)
  }
}

function checkRow(row: Row, checker: ChainChecker): string | null {
  let event: LedgerEvent
  try {
    event = parseCanonical(row.canonical) as unknown as LedgerEvent
  } catch (error) {
    return (error as Error).message
  }
  if (!checker.add({ event, digest: row.digest, leafHash: row.leafHash }))
    return checker.result().firstBroken?.detail ?? 'does not hold'
  const same =
    event.sequence === Number(row.sequence) &&
    event.time === row.at.toISOString() &&
    event.action === row.action &&
    event.subject.kind === row.subjectKind &&
    event.subject.id === row.subjectId &&
    event.subjectSequence === Number(row.subjectSequence)
  return same ? null : 'the columns beside the event say something else than the event'
}

/** The state row must be that of the last event: a ledger whose end was cut off shows here. */
async function checkState(services: Pick<Services, 'db'>, checker: ChainChecker): Promise<Broken> {
  const { treeSize, lastDigest } = checker.result()
  const state = await services.db.row<{ size: string; digest: string }>(
    'select tree_size as size, last_digest as digest from record.ledger_state',
  )
  if (!state || Number(state.size) < treeSize)
    return { sequence: treeSize, detail: 'the state of the ledger is older than its events' }
  if (Number(state.size) > treeSize) {
    // Events may have been added while the rows were read; anything missing in between is a cut.
    const end = await services.db.row<{ size: string }>('select max(sequence) as size from record.events')
    if (Number(end?.size) < Number(state.size))
      return { sequence: treeSize + 1, detail: 'events at the end of the ledger are missing' }
    return null
  }
  return state.digest === lastDigest
    ? null
    : { sequence: treeSize, detail: 'the state of the ledger names another last event' }
}

async function checkHeads(
  services: Pick<Services, 'db'>,
  heads: Awaited<ReturnType<typeof allHeads>>,
  checker: ChainChecker,
): Promise<Broken> {
  const keys = new Map((await ledgerKeys(services)).map(({ sha256, publicKey }) => [sha256, publicKey]))
  for (const { head, signature } of heads) {
    const key = keys.get(head.keySha256)
    const at = { sequence: head.treeSize }
    if (!key || !verifySignature(key, headBytes(head), signature))
      return { ...at, detail: 'the signature of the head over this event does not hold' }
    const root = checker.rootAt(head.treeSize)
    if (root !== undefined && root !== head.rootHash)
      return { ...at, detail: 'the head over this event has another root: events before it were changed' }
    if (root === undefined && head.treeSize <= checker.result().treeSize)
      return { ...at, detail: 'the head over this event cannot be compared' }
  }
  return null
}

async function compareHead(
  services: Pick<Services, 'db'>,
  given: GivenHead,
  checker: ChainChecker,
  treeSize: number,
): Promise<Verification['head']> {
  const { head } = given
  const own = await services.db.row<{ id: string }>('select id from record.laboratory')
  const keys = new Map((await ledgerKeys(services)).map(({ sha256, publicKey }) => [sha256, publicKey]))
  const key = keys.get(head.keySha256)
  if (head.laboratory !== own?.id || !key) return 'differs'
  if (!verifySignature(key, headBytes(head), Buffer.from(given.signature, 'base64'))) return 'differs'
  // A signed head larger than the ledger says that events are gone.
  if (head.treeSize > treeSize) return 'differs'
  return checker.rootAt(head.treeSize) === head.rootHash ? 'matches' : 'differs'
}

function sentence(broken: Broken, head: Verification['head'], events: number, heads: number): string {
  if (broken) return `Event ${broken.sequence} does not hold: ${broken.detail}.`
  if (head === 'differs')
    return 'All events hold together, but the head that was given is not one of this ledger: its history was rewritten or cut.'
  const compared = head === 'matches' ? ' The head that was given is one of this ledger.' : ''
  return `All ${events} events and ${heads} signed heads hold.${compared}`
}
