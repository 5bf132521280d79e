/**
 * The fringe mark: a drawing from a SHA-256 digest that helps the eye to recognise it again. It never replaces
 * comparing digits. The square of 48 units is cut by its diagonal; each half shows interference fringes, circles about
 * one centre, chosen by eight bytes (upper half bytes 0 to 7, lower half 16 to 23):
 *
 * b0 & 1: dark or light ground. b1 % 4: family, by the distance of the centre: straight (900 units), bowed (46), bowed
 * (24), rings (0). b2 % 8: direction × 22.5° + 11.25°. b3 % 4: pitch 6.2 + 1.7 n. b4 % 6: phase in sixths of the pitch.
 * b5, b6: weight of each fringe in turn, lowest bit first, thick 0.56 or thin 0.24 of the pitch. b7 & 1: the other side.
 */
export type Fringe = { radius: number; width: number }
export type FringeHalf = { darkGround: boolean; centre: { x: number; y: number }; fringes: Fringe[] }

const distances = [900, 46, 24, 0]
const fringeCount = 19

/** @throws RangeError if the text is not 64 hexadecimal digits. */
export function fringeHalves(sha256: string): { upper: FringeHalf; lower: FringeHalf } {
  if (!/^[0-9a-f]{64}$/i.test(sha256))
    throw new RangeError('A fringe mark needs the 64 hexadecimal digits of a SHA-256.')
  const bytes = Array.from({ length: 32 }, (_, at) => parseInt(sha256.slice(2 * at, 2 * at + 2), 16))
  return { upper: half(bytes.slice(0, 8), 16), lower: half(bytes.slice(16, 24), 32) }
}

function half(bytes: number[], origin: number): FringeHalf {
  const [tone = 0, family = 0, direction = 0, pitchStep = 0, phaseStep = 0, low = 0, high = 0, side = 0] =
    bytes
  const distance = distances[family % 4] ?? 0
  const angle = (((direction % 8) * 22.5 + 11.25) * Math.PI) / 180
  const sign = side & 1 ? -1 : 1
  const pitch = 6.2 + 1.7 * (pitchStep % 4)
  const phase = (phaseStep % 6) / 6
  const weights = low | (high << 8)
  // Rings start at their centre; the other families are laid about the middle of the half.
  const first = distance === 0 ? 0 : -Math.floor(fringeCount / 2)
  const fringes: Fringe[] = []
  for (let at = 0; at < fringeCount; at++) {
    const radius = distance + (first + at + phase) * pitch
    const thick = (weights >> (at % 16)) & 1
    if (radius > 0.01) fringes.push({ radius, width: (thick ? 0.56 : 0.24) * pitch })
  }
  return {
    darkGround: (tone & 1) === 1,
    centre: { x: origin + sign * distance * Math.cos(angle), y: origin + sign * distance * Math.sin(angle) },
    fringes,
  }
}
