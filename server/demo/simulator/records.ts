import { darkArrivals, detect, split, tagText, type Detector } from './detection.ts'
import { chaoticLight, drivenEmitter, heraldedPairs, pulsedEmitter } from './light.ts'
import { seededRandom } from './random.ts'

/** The laboratory's two detectors of the beam splitter and the herald, as the demonstration tells of them. */
export const heron: Detector = { channel: 1, jitterFwhmPs: 350, deadTimePs: 45_000, darkCps: 62 }
export const plover: Detector = { channel: 2, jitterFwhmPs: 380, deadTimePs: 45_000, darkCps: 87 }
export const lapwing: Detector = { channel: 0, jitterFwhmPs: 420, deadTimePs: 45_000, darkCps: 110 }

/** A quantum dot under continuous drive behind a 50 : 50 splitter, with a steady leak of the drive laser. */
export function continuousRecord(
  seed: number,
  light: { drivePs: number; lifetimePs: number; efficiency: number; leakCps: number },
  seconds: number,
): string {
  const random = seededRandom(seed)
  const duration = seconds * 1e12
  const photons = [...drivenEmitter(random, light, duration), ...darkArrivals(random, light.leakCps, duration)]
  const [a, b] = split(random, photons, 0.508)
  return tagText([detect(random, a, heron, duration), detect(random, b, plover, duration)])
}

/** A quantum dot driven by pulses of 80 MHz. */
export function pulsedRecord(seed: number, light: { lifetimePs: number; efficiency: number; secondChance: number }, seconds: number): string {
  const random = seededRandom(seed)
  const duration = seconds * 1e12
  const [a, b] = split(random, pulsedEmitter(random, { ...light, periodPs: 12_500 }, duration), 0.508)
  return tagText([detect(random, a, heron, duration), detect(random, b, plover, duration)])
}

/** A narrow lamp line: bunched light. */
export function lampRecord(seed: number, light: { coherencePs: number; meanCps: number }, seconds: number): string {
  const random = seededRandom(seed)
  const duration = seconds * 1e12
  const [a, b] = split(random, chaoticLight(random, light, duration), 0.508)
  return tagText([detect(random, a, heron, duration), detect(random, b, plover, duration)])
}

/** Heralded photons: herald on channel 0, the signal split onto channels 1 and 2. */
export function heraldedRecord(seed: number, light: { pairsCps: number; heraldEfficiency: number; signalEfficiency: number }, seconds: number): string {
  const random = seededRandom(seed)
  const duration = seconds * 1e12
  const pairs = heraldedPairs(random, { ...light, signalDelayPs: 4_800 }, duration)
  const [a, b] = split(random, pairs.signal, 0.5)
  return tagText([
    detect(random, pairs.herald, lapwing, duration),
    detect(random, a, heron, duration),
    detect(random, b, plover, duration),
  ])
}

/** Detectors in the dark. */
export function darkRecord(seed: number, seconds: number): string {
  const random = seededRandom(seed)
  const duration = seconds * 1e12
  return tagText([detect(random, [], heron, duration), detect(random, [], plover, duration)])
}
