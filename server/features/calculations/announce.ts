import type { Transaction } from 'sequelize'
import type { Services } from '../../platform/services.ts'

/** Channels on which the state of one calculation is told and its cancelling asked for. */
export const changedChannel = (id: string): string => `calculation:${id}`
export const cancelChannel = (id: string): string => `calculation-cancel:${id}`

/** Tells who watches that the calculation changed; they fetch the state themselves. */
export function announce(services: Pick<Services, 'events'>, id: string, t?: Transaction): Promise<void> {
  return services.events.notify(changedChannel(id), null, t)
}
