import { nothingHere } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { requireEntry, type EntryRow } from '../entries/index.ts'
import { findCalculation, type CalculationRow } from './repository.ts'

/** A calculation that the caller may read, with its entry. */
export async function requireCalculation(
  services: Services,
  actor: Actor,
  id: string,
): Promise<{ calculation: CalculationRow; entry: EntryRow }> {
  const calculation = await findCalculation(services.db, id)
  if (calculation === null) throw nothingHere()
  return { calculation, entry: await requireEntry(services, actor, calculation.entryId, 'read') }
}
