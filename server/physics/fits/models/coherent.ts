import type { FitModel } from '../model.ts'

/** Coherent light: g2 = 1 at every delay; nothing to fit but a free level. */
export const coherent: FitModel = {
  name: 'coherent',
  title: 'Coherent light',
  parameters: () => [],
  mean: () => 1,
  starts: () => [[]],
  atZero: { parameter: null, offset: 1, slope: 0 },
}
