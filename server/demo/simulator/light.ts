import type { Random } from './random.ts'

/**
 * Photons of a continuously driven two-level emitter that reach the detectors. Each emission takes an exponential wait for
 * the drive and one for the decay; `efficiency` of them are seen, so between two seen photons lie geometrically many
 * emissions. g2 = 1 - exp(-|tau| (1/drive + 1/lifetime)).
 */
export function drivenEmitter(
  random: Random,
  light: { drivePs: number; lifetimePs: number; efficiency: number },
  durationPs: number,
): number[] {
  const arrivals: number[] = []
  let time = 0
  for (;;) {
    const emissions = random.geometric(light.efficiency)
    time += light.drivePs * random.gamma(emissions) + light.lifetimePs * random.gamma(emissions)
    if (time >= durationPs) return arrivals
    arrivals.push(time)
  }
}

/**
 * Photons of an emitter driven by pulses of this period: at most one a pulse, `efficiency` of them seen, later than the pulse
 * by an exponential lifetime; with the chance `secondChance` a second photon follows in the same pulse.
 */
export function pulsedEmitter(
  random: Random,
  light: { periodPs: number; lifetimePs: number; efficiency: number; secondChance: number },
  durationPs: number,
): number[] {
  const arrivals: number[] = []
  const pulses = Math.floor(durationPs / light.periodPs)
  for (let pulse = random.geometric(light.efficiency); pulse < pulses; pulse += random.geometric(light.efficiency)) {
    const start = pulse * light.periodPs
    arrivals.push(start + random.exponential(light.lifetimePs))
    if (random.uniform() < light.secondChance) arrivals.push(start + random.exponential(light.lifetimePs))
  }
  return arrivals.sort((a, b) => a - b)
}

/**
 * Photons of chaotic light with a Lorentzian line: the field is a complex Ornstein-Uhlenbeck process with correlation
 * exp(-|tau|/tc), its intensity the momentary rate (Mandel's formula). Steps of tc/20.
 */
export function chaoticLight(random: Random, light: { coherencePs: number; meanCps: number }, durationPs: number): number[] {
  const step = light.coherencePs / 20
  const keep = Math.exp(-step / light.coherencePs)
  const kick = Math.sqrt((1 - keep * keep) / 2)
  const perStep = (light.meanCps * step) / 1e12
  const arrivals: number[] = []
  let re = random.normal() * Math.SQRT1_2
  let im = random.normal() * Math.SQRT1_2
  let untilNext = random.exponential(1)
  for (let time = 0; time < durationPs; time += step) {
    let spent = perStep * (re * re + im * im)
    while (untilNext < spent) {
      arrivals.push(time + step * random.uniform())
      spent -= untilNext
      untilNext = random.exponential(1)
    }
    untilNext -= spent
    re = keep * re + kick * random.normal()
    im = keep * im + kick * random.normal()
  }
  return arrivals.sort((a, b) => a - b)
}

/** Photon pairs born together at random times: herald and signal, each seen with its own chance. */
export function heraldedPairs(
  random: Random,
  light: { pairsCps: number; heraldEfficiency: number; signalEfficiency: number; signalDelayPs: number },
  durationPs: number,
): { herald: number[]; signal: number[] } {
  const herald: number[] = []
  const signal: number[] = []
  const mean = 1e12 / light.pairsCps
  for (let time = random.exponential(mean); time < durationPs; time += random.exponential(mean)) {
    if (random.uniform() < light.heraldEfficiency) herald.push(time)
    if (random.uniform() < light.signalEfficiency) signal.push(time + light.signalDelayPs)
  }
  return { herald, signal }
}
