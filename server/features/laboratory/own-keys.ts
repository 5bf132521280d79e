import { signMessage } from '../../ledger-format/ed25519.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { openAuthority, type Authority } from './authority.ts'
import { loadKey } from './key-files.ts'
import { laboratory } from './laboratory.ts'

type Needs = Pick<Services, 'db' | 'config'>

export interface LedgerKey {
  /** SHA-256 of the SPKI (DER), hex. */
  sha256: string
  /** Raw, 32 bytes. */
  publicKey: Buffer
  sign(message: Uint8Array): Uint8Array
}

const authorities = new WeakMap<object, Promise<Authority>>()
const ledgerKeys = new Map<string, Buffer>()

/** The laboratory's certificate authority, opened once per process. */
export function certificateAuthority(services: Needs, t?: Transaction): Promise<Authority> {
  const cached = authorities.get(services.db)
  if (cached) return cached
  const opened = laboratory(services, t).then(({ caCertificate }) =>
    openAuthority(caCertificate, loadKey(services.config, 'certificate-authority')),
  )
  authorities.set(services.db, opened)
  opened.catch(() => authorities.delete(services.db))
  return opened
}

/** The ledger key in force. */
export async function ledgerKey(services: Needs, t?: Transaction): Promise<LedgerKey> {
  const row = await services.db.row<{ sha256: string; publicKey: Buffer }>(
    `select sha256, public_key as "publicKey" from record.ledger_keys order by position desc limit 1`,
    {},
    t,
  )
  if (!row) throw new Error('The laboratory has no ledger key.')
  const seed = ledgerKeys.get(row.sha256) ?? loadKey(services.config, `ledger-${row.sha256.slice(0, 16)}`)
  ledgerKeys.set(row.sha256, seed)
  return { ...row, sign: (message) => signMessage(seed, message) }
}
