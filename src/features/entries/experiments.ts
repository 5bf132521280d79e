import type { Experiment } from '../../../server/contract/common.ts'
import type { DocumentNode, NormalDocument } from '../../../server/document/document.ts'

export interface Template {
  experiment: Experiment
  name: string
  about: string
  /** Title that a new sheet starts with. */
  title: string
}

/** Names of all experiments, for lists. */
export const experimentNames: Record<Experiment, string> = {
  hbt: 'HBT, continuous',
  'hbt-pulsed': 'HBT, pulsed',
  heralded: 'Heralded source',
  dip: 'Two-photon dip',
  polarisation: 'Polarisation correlation',
  chaotic: 'Chaotic light',
  fringe: 'Fringe scan',
  calibration: 'Calibration',
  other: 'Other',
}

/** Sheets that one can start with one press; the first four are offered everywhere. */
export const templates: Template[] = [
  {
    experiment: 'hbt',
    name: 'Single-photon purity, HBT',
    about: 'Correlation at zero delay, rates, accidentals',
    title: 'Single-photon purity',
  },
  {
    experiment: 'heralded',
    name: 'Heralded source',
    about: 'Threefold counts, heralding efficiency',
    title: 'Heralded source',
  },
  {
    experiment: 'dip',
    name: 'Two-photon interference dip',
    about: 'Delay scan, visibility',
    title: 'Two-photon interference',
  },
  {
    experiment: 'polarisation',
    name: 'Polarisation correlation',
    about: 'Fringe scans, S value',
    title: 'Polarisation correlation',
  },
]

/** Heads that every template starts with: what one set out to do, with what, what was seen, what follows. */
const heads = ['Aim', 'Set-up', 'Observations', 'Result']

/** The text of a sheet that starts from a template. */
export function templateDocument(): NormalDocument {
  const content = heads.flatMap((head, at): DocumentNode[] => [
    { type: 'heading', attrs: { id: `head-${at}`, level: 2 }, content: [{ type: 'text', text: head }] },
    { type: 'paragraph', attrs: { id: `text-${at}` } },
  ])
  return { type: 'doc', content }
}
