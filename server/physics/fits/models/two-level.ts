import { featureOf, scalesOf } from '../correlation-data.ts'
import { meanTwoSided } from '../gaussian-response.ts'
import { tau0Parameter, timeConstant, type FitModel } from '../model.ts'

/** Two-level emitter: 1 - (1 - g0) exp(-|x|/t1). */
export const twoLevel: FitModel = {
  name: 'two-level',
  title: 'Two-level emitter',
  parameters: (data) => {
    const scales = scalesOf(data)
    return [
      { name: 'g0', unit: '1', lower: 0, upper: Infinity, scale: 0.1, physicalBound: 0 },
      timeConstant('t1', scales),
      tau0Parameter(scales),
    ]
  },
  mean: (from, to, sigma, [g0, t1, tau0]) =>
    1 - (1 - g0!) * meanTwoSided(from - tau0!, to - tau0!, t1!, sigma),
  starts: (data) => {
    const { range, bin } = scalesOf(data)
    const dip = featureOf(data, -1, 5)
    const depth = Math.min(Math.max(-dip.height, 0.1), 0.95)
    const fromArea = Math.min(Math.max(-dip.area / (2 * depth), bin), range)
    return [fromArea, range / 5, range / 20, range / 80].flatMap((t1) => [
      [1 - depth, t1, dip.position],
      [1 - depth, t1, 0],
    ])
  },
  atZero: { parameter: 0, offset: 0, slope: 1 },
}
