import type { ApparatusName } from '../apparatus.ts'
import type { DemoBench, DemoPerson } from '../bench.ts'

/** What an act of the scenario works with. */
export interface Scene {
  bench: DemoBench
  maren: DemoPerson
  teo: DemoPerson
  farid: DemoPerson
  noor: DemoPerson
  apparatus: Record<ApparatusName, string>
}

/** Something that happens so many days before today at this time of day (UTC); acts are played in order of time. */
export interface Act {
  daysAgo: number
  at: `${number}:${number}`
  play(scene: Scene): Promise<void>
}

/** The beam-splitter set-up as a run names it. */
export function splitterSetup(apparatus: Scene['apparatus'], source: ApparatusName) {
  return [
    { id: apparatus[source], role: 'source', channel: null },
    { id: apparatus.splitter, role: 'splitter', channel: null },
    { id: apparatus.heron, role: 'A', channel: 1 },
    { id: apparatus.plover, role: 'B', channel: 2 },
  ]
}

export const LASER_CAUTION =
  'Cautions: class 3B drive laser, beam path enclosed and interlocks checked before the run, eyewear as posted at the table; ' +
  'helium cryostat, oxygen monitor on. Local rules and the responsible laser safety officer decide.'
