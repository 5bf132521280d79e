import { randomUUID } from 'node:crypto'
import type { Apparatus } from '../contract/runs.ts'
import { insertApparatus } from '../features/runs/index.ts'
import type { Services } from '../platform/services.ts'
import { appendEvent } from '../features/ledger/index.ts'

type Kind = Apparatus['kind']

/** Invented equipment of the Ridgeway Photonics Laboratory, by the short name that the scenario uses. */
const REGISTER = {
  heron: ['detector', 'D1 Heron', [['efficiency', '0.65', '0.02', '1'], ['dark rate', '62', '3', 'cps'], ['dead time', '45', '2', 'ns'], ['timing response FWHM', '350', '15', 'ps']]],
  plover: ['detector', 'D2 Plover', [['efficiency', '0.63', '0.02', '1'], ['dark rate', '87', '4', 'cps'], ['dead time', '45', '2', 'ns'], ['timing response FWHM', '380', '15', 'ps']]],
  lapwing: ['detector', 'D3 Lapwing', [['efficiency', '0.58', '0.03', '1'], ['dark rate', '110', '5', 'cps'], ['dead time', '45', '2', 'ns'], ['timing response FWHM', '420', '20', 'ps']]],
  dot31b: ['source', 'RPL-QD-31b', [['wavelength', '915.3', '0.1', 'nm']]],
  dot27a: ['source', 'RPL-QD-27a', [['wavelength', '921.8', '0.1', 'nm'], ['repetition rate', '80.0', null, 'MHz']]],
  crystal: ['source', 'RPL-PP-04', [['pump wavelength', '405.0', '0.1', 'nm'], ['phase-matching temperature', '41.2', '0.2', '°C']]],
  lamp: ['source', 'Lamp, 546 nm line', [['wavelength', '546.1', null, 'nm']]],
  splitter: ['splitter', 'BS-50 cube', [['transmission', '0.508', '0.004', '1'], ['reflection', '0.492', '0.004', '1']]],
  filter: ['filter', 'Band-pass 915/0.3', [['width', '0.3', '0.02', 'nm']]],
} as const satisfies Record<string, [Kind, string, [string, string, string | null, string][]]>

export type ApparatusName = keyof typeof REGISTER

/** Puts the equipment into the register; answers its ids. */
export async function registerApparatus(services: Services): Promise<Record<ApparatusName, string>> {
  const ids: Partial<Record<ApparatusName, string>> = {}
  for (const name of Object.keys(REGISTER) as ApparatusName[]) {
    const [kind, title, figures] = REGISTER[name]
    const id = randomUUID()
    ids[name] = id
    await services.db.transaction(async (t) => {
      await insertApparatus(
        services.db,
        {
          id,
          version: 1,
          kind,
          name: title,
          figures: figures.map(([figure, value, u, unit]) => ({ name: figure, value, u, unit, calibrationId: null })),
        },
        services.clock.now(),
        t,
      )
      await appendEvent(services, t, {
        actor: { kind: 'system', id: null, onBehalfOf: null },
        action: 'apparatus.registered',
        subject: { kind: 'apparatus', id },
        payload: { version: 1 },
      })
    })
  }
  return ids as Record<ApparatusName, string>
}
