/** Seeded random numbers in [0, 1) for simulations in tests (mulberry32, a public-domain mixing function). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let x = Math.imul(state ^ (state >>> 15), state | 1)
    x ^= x + Math.imul(x ^ (x >>> 7), x | 61)
    return ((x ^ (x >>> 14)) >>> 0) / 4294967296
  }
}

/** A Poisson number of the given mean, by counting exponential waiting times. */
export function poisson(random: () => number, mean: number): number {
  let n = -1
  for (let t = 0; t <= mean; n++) t -= Math.log(1 - random())
  return n
}

/** Ascending times of a Poisson process of rate `perPs` over `durationPs`. */
export function poissonTimes(random: () => number, perPs: number, durationPs: number): number[] {
  const times: number[] = []
  for (let t = 0; ;) {
    t -= Math.log(1 - random()) / perPs
    if (t >= durationPs) return times
    times.push(Math.floor(t))
  }
}
