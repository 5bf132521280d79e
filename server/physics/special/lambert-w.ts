/**
 * Smallest root y of z = y exp(-y) for 0 <= z < 1/e, that is minus the principal branch of Lambert W at -z.
 * Newton's method on ln y - y - ln z, which is concave and rises, so the steps from y = z never overshoot.
 */
export function smallestRootOfYExpMinusY(z: number): number {
  if (z === 0) return 0
  const logZ = Math.log(z)
  let y = z
  for (let step = 0; step < 200; step++) {
    const change = (Math.log(y) - y - logZ) / (1 / y - 1)
    const next = Math.min(y - change, 1)
    if (Math.abs(next - y) <= 2e-16 * y) return next
    y = next
  }
  return y
}
