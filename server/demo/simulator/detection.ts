import type { Random } from './random.ts'

/** One detector behind the light: what it adds and what it loses. Times in ps. */
export interface Detector {
  channel: number
  /** Full width at half maximum of its timing response, ps. */
  jitterFwhmPs: number
  deadTimePs: number
  /** Counts per second without light. */
  darkCps: number
}

export interface Tag {
  timePs: number
  channel: number
}

const FWHM_PER_SIGMA = 2 * Math.sqrt(2 * Math.LN2)

/** Tags of one detector from photon arrivals in ascending order: dark counts added, response smeared, dead time applied. */
export function detect(random: Random, arrivalsPs: readonly number[], detector: Detector, durationPs: number): Tag[] {
  const sigma = detector.jitterFwhmPs / FWHM_PER_SIGMA
  const clicks = [...arrivalsPs, ...darkArrivals(random, detector.darkCps, durationPs)]
    .map((time) => Math.round(time + sigma * random.normal()))
    .filter((time) => time >= 0 && time < durationPs)
    .sort((a, b) => a - b)
  const tags: Tag[] = []
  let readyAt = -Infinity
  for (const timePs of clicks) {
    if (timePs < readyAt) continue
    tags.push({ timePs, channel: detector.channel })
    readyAt = timePs + detector.deadTimePs
  }
  return tags
}

/** Poisson arrivals of a steady rate. */
export function darkArrivals(random: Random, cps: number, durationPs: number): number[] {
  const arrivals: number[] = []
  if (cps <= 0) return arrivals
  const mean = 1e12 / cps
  for (let time = random.exponential(mean); time < durationPs; time += random.exponential(mean)) arrivals.push(time)
  return arrivals
}

/** Sends each photon to the first or the second output of a splitter. */
export function split(random: Random, arrivalsPs: readonly number[], transmission: number): [number[], number[]] {
  const outputs: [number[], number[]] = [[], []]
  for (const time of arrivalsPs) outputs[random.uniform() < transmission ? 0 : 1].push(time)
  return outputs
}

/** Records of several detectors as one delimited text, in order of time. */
export function tagText(records: readonly Tag[][]): string {
  const tags = records.flat().sort((a, b) => a.timePs - b.timePs || a.channel - b.channel)
  return `time_ps,channel\n${tags.map((tag) => `${tag.timePs},${tag.channel}`).join('\n')}\n`
}
