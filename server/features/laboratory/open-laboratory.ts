import { randomBytes, randomUUID } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { sha256Hex } from '../../ledger-format/digest.ts'
import { publicKeyOf, spkiOf } from '../../ledger-format/ed25519.ts'
import type { Services } from '../../platform/services.ts'
import { rootDigests } from '../../platform/timestamps/time-stamp.ts'
import { appendEvent, systemActor } from '../ledger/index.ts'
import { createAuthority } from './authority.ts'
import { removeKey, storeKey } from './key-files.ts'
import { findLaboratory, type Laboratory } from './laboratory.ts'

/**
 * Opens the laboratory in an empty database, once: its certificate authority, its ledger key, event 1. The private keys
 * are written to `<data>/keys`, wrapped by HALFSILVER_SECRET.
 */
export async function openLaboratory(
  services: Pick<Services, 'db' | 'clock' | 'config'>,
  given: { name: string; demo: boolean },
): Promise<Laboratory> {
  if (await findLaboratory(services))
    throw new Error('This database holds a laboratory already; nothing was changed.')
  const id = randomUUID()
  const now = services.clock.now()
  const authority = await createAuthority({ id, name: given.name }, now)
  const seed = randomBytes(32)
  const publicKey = publicKeyOf(seed)
  const keySha256 = sha256Hex(spkiOf(publicKey))
  const chain = readFileSync(services.config.timeStamps.chainFile, 'utf8')
  const [tsaRootSha256, ...furtherRoots] = rootDigests(chain)
  if (!tsaRootSha256 || furtherRoots.length > 0)
    throw new Error(
      `TSA_CHAIN_FILE must hold exactly one root; ${services.config.timeStamps.chainFile} holds another number.`,
    )

  const stored: Parameters<typeof storeKey>[1][] = []
  try {
    storeKey(services.config, 'certificate-authority', authority.privateKey)
    stored.push('certificate-authority')
    storeKey(services.config, `ledger-${keySha256.slice(0, 16)}`, seed)
    stored.push(`ledger-${keySha256.slice(0, 16)}`)
    await services.db.transaction(async (t) => {
      const run = (sql: string, values: Record<string, unknown>) => services.db.run(sql, values, t)
      await run(
        `insert into record.laboratory (id, name, demo, zone, ca_certificate, opened_at)
         values (:id, :name, :demo, :zone, :certificate, :now)`,
        { id, ...given, zone: services.config.laboratory.zone, certificate: authority.certificate.pem, now },
      )
      await run(
        `insert into record.ledger_keys (sha256, position, public_key, since) values (:keySha256, 1, :publicKey, :now)`,
        {
          keySha256,
          publicKey: Buffer.from(publicKey),
          now,
        },
      )
      await run(`insert into record.tsa_roots (sha256, chain, since) values (:tsaRootSha256, :chain, :now)`, {
        tsaRootSha256,
        chain,
        now,
      })
      const payload = {
        laboratory: id,
        demo: given.demo,
        caSha256: authority.certificate.sha256,
        ledgerKeySha256: keySha256,
        tsaRootSha256,
      }
      await appendEvent(services, t, {
        actor: systemActor,
        action: 'laboratory.opened',
        subject: { kind: 'laboratory', id },
        payload,
      })
    })
  } catch (error) {
    for (const name of stored) removeKey(services.config, name)
    throw error
  }
  return (await findLaboratory(services)) as Laboratory
}
