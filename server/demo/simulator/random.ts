/** Seeded random numbers: the same seed gives the same record on every machine. */
export interface Random {
  /** Uniform in (0, 1). */
  uniform(): number
  /** Exponential with this mean. */
  exponential(mean: number): number
  /** Normal with mean 0 and standard deviation 1. */
  normal(): number
  /** Sum of `shape` exponentials of mean 1 (gamma distribution); shape >= 1, not necessarily whole. */
  gamma(shape: number): number
  /** Trials up to and with the first success, each of this probability. */
  geometric(probability: number): number
}

/** xoshiro128++ (Blackman and Vigna, ACM Trans. Math. Softw. 47, 36 (2021)), seeded by splitmix32. */
export function seededRandom(seed: number): Random {
  const state = seedState(seed)
  let spareNormal: number | null = null

  function next32(): number {
    const [a, b, c, d] = state
    const sum = (a + d) | 0
    const x = c ^ a
    const y = d ^ b
    state[0] = a ^ y
    state[1] = b ^ x
    state[2] = x ^ (b << 9)
    state[3] = (y << 11) | (y >>> 21)
    return (((sum << 7) | (sum >>> 25)) + a) >>> 0
  }

  const uniform = () => (next32() * 2 ** 21 + (next32() >>> 11) + 0.5) / 2 ** 53
  const exponential = (mean: number) => -mean * Math.log(uniform())

  /** Box and Muller, Ann. Math. Stat. 29, 610 (1958). */
  function normal(): number {
    if (spareNormal !== null) {
      const value = spareNormal
      spareNormal = null
      return value
    }
    const radius = Math.sqrt(-2 * Math.log(uniform()))
    const angle = 2 * Math.PI * uniform()
    spareNormal = radius * Math.sin(angle)
    return radius * Math.cos(angle)
  }

  /** Marsaglia and Tsang, ACM Trans. Math. Softw. 26, 363 (2000). */
  function gamma(shape: number): number {
    const d = shape - 1 / 3
    const c = 1 / Math.sqrt(9 * d)
    for (;;) {
      const x = normal()
      const v = (1 + c * x) ** 3
      if (v <= 0) continue
      if (Math.log(uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v)) return d * v
    }
  }

  const geometric = (probability: number) => Math.max(1, Math.ceil(Math.log(uniform()) / Math.log1p(-probability)))
  return { uniform, exponential, normal, gamma, geometric }
}

function seedState(seed: number): [number, number, number, number] {
  let s = seed | 0
  const word = () => {
    s = (s + 0x9e3779b9) | 0
    let z = s ^ (s >>> 16)
    z = Math.imul(z, 0x21f0aaad)
    z ^= z >>> 15
    z = Math.imul(z, 0x735a2d97)
    return z ^ (z >>> 15)
  }
  return [word(), word(), word(), word()]
}
