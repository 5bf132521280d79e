/**
 * Squared magnitude of the discrete Fourier transform of real data at frequencies 0 .. n/2, n a power of two: bin j is j periods over the
 * data. Radix-2, in place (Cooley & Tukey, Math. Comp. 19, 297 (1965); from memory).
 */
export function powerSpectrum(data: Float64Array): Float64Array {
  const n = data.length
  if (n < 2 || (n & (n - 1)) !== 0) throw new RangeError(`The length ${n} is no power of two.`)
  const re = bitReversed(data)
  const im = new Float64Array(n)
  for (let size = 2; size <= n; size *= 2) {
    const half = size / 2
    for (let k = 0; k < half; k++) {
      const angle = (-2 * Math.PI * k) / size
      const [cos, sin] = [Math.cos(angle), Math.sin(angle)]
      for (let i = k; i < n; i += size) {
        const j = i + half
        const [x, y] = [re[j]! * cos - im[j]! * sin, re[j]! * sin + im[j]! * cos]
        re[j] = re[i]! - x
        im[j] = im[i]! - y
        re[i]! += x
        im[i]! += y
      }
    }
  }
  return Float64Array.from({ length: n / 2 + 1 }, (_, j) => re[j]! ** 2 + im[j]! ** 2)
}

function bitReversed(data: Float64Array): Float64Array {
  const n = data.length
  const out = new Float64Array(n)
  for (let i = 0, j = 0; i < n; i++) {
    out[j] = data[i]!
    let bit = n >> 1
    for (; j & bit; bit >>= 1) j ^= bit
    j ^= bit
  }
  return out
}
