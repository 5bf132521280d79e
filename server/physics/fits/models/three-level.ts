import { featureOf, scalesOf } from '../correlation-data.ts'
import { meanTwoSided } from '../gaussian-response.ts'
import { tau0Parameter, timeConstant, type FitModel } from '../model.ts'

/** Three-level emitter with a shelving state: 1 - c [(1 + a) exp(-|x|/t1) - a exp(-|x|/t2)], t2 > t1. */
export const threeLevel: FitModel = {
  name: 'three-level',
  title: 'Three-level emitter (shelving)',
  parameters: (data) => {
    const scales = scalesOf(data)
    return [
      { name: 'c', unit: '1', lower: 0, upper: 1, scale: 0.1, physicalBound: 1 },
      { name: 'a', unit: '1', lower: 0, upper: Infinity, scale: 0.1 },
      timeConstant('t1', scales),
      timeConstant('t2', scales),
      tau0Parameter(scales),
    ]
  },
  mean: (from, to, sigma, [c, a, t1, t2, tau0]) => {
    const [x0, x1] = [from - tau0!, to - tau0!]
    return 1 - c! * ((1 + a!) * meanTwoSided(x0, x1, t1!, sigma) - a! * meanTwoSided(x0, x1, t2!, sigma))
  },
  starts: (data) => {
    const { range } = scalesOf(data)
    const dip = featureOf(data, -1, 3)
    const depth = Math.min(Math.max(-dip.height, 0.1), 0.95)
    return [range / 5, range / 20, range / 80].flatMap((t1) =>
      [4, 20].flatMap((ratio) => [0.2, 1].map((a) => [depth, a, t1, t1 * ratio, dip.position])),
    )
  },
  atZero: { parameter: 0, offset: 1, slope: -1 },
  impossible: ([, , t1, t2]) => t2! <= t1!,
}
