import { createHash, X509Certificate } from 'node:crypto'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'

export interface Laboratory {
  id: string
  name: string
  demo: boolean
  /** IANA time zone, as signed with each signature. */
  zone: string
  /** PEM. */
  caCertificate: string
  /** SHA-256 of its DER, hex. */
  caSha256: string
  openedAt: Date
}

const known = new WeakMap<object, Laboratory>()

/** The one laboratory of this database, read once per process; null before it is opened. */
export async function findLaboratory(
  services: Pick<Services, 'db'>,
  t?: Transaction,
): Promise<Laboratory | null> {
  const cached = known.get(services.db)
  if (cached) return cached
  const row = await services.db.row<Omit<Laboratory, 'caSha256'>>(
    `select id, name, demo, zone, ca_certificate as "caCertificate", opened_at as "openedAt" from record.laboratory`,
    {},
    t,
  )
  if (!row) return null
  const der = new X509Certificate(row.caCertificate).raw
  const laboratory = { ...row, caSha256: createHash('sha256').update(der).digest('hex') }
  known.set(services.db, laboratory)
  return laboratory
}

/** The laboratory; an error before it is opened. */
export async function laboratory(services: Pick<Services, 'db'>, t?: Transaction): Promise<Laboratory> {
  const found = await findLaboratory(services, t)
  if (!found) throw new Error('This database holds no laboratory yet. Open it by the command line first.')
  return found
}
