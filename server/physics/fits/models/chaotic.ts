import { featureOf, scalesOf, type CorrelationData } from '../correlation-data.ts'
import { meanGaussian, meanTwoSided } from '../gaussian-response.ts'
import { tau0Parameter, timeConstant, type FitModel } from '../model.ts'
import type { BoundedParameter } from '../bounded-fit.ts'

function parameters(data: CorrelationData): BoundedParameter[] {
  const scales = scalesOf(data)
  return [
    { name: 'beta', unit: '1', lower: 0, upper: Infinity, scale: 0.1, physicalBound: 0 },
    timeConstant('tc', scales),
    tau0Parameter(scales),
  ]
}

/** tc is the integral of |g1|^2 (Mandel), so the area of the peak is beta tc for either line. */
function starts(data: CorrelationData): number[][] {
  const { range, bin } = scalesOf(data)
  const peak = featureOf(data, 1, 3)
  const beta = Math.max(peak.height, 0.02)
  const fromArea = Math.min(Math.max(peak.area / beta, bin), range)
  return [fromArea, range / 3, range / 15, range / 60].flatMap((tc) => [
    [beta, tc, peak.position],
    [beta, tc, 0],
  ])
}

/** Chaotic light of a Lorentzian line: 1 + beta exp(-2 |x|/tc). Line FWHM = 1/(pi tc). */
export const chaoticLorentzian: FitModel = {
  name: 'chaotic-lorentzian',
  title: 'Chaotic light, Lorentzian line',
  parameters,
  starts,
  mean: (from, to, sigma, [beta, tc, tau0]) =>
    1 + beta! * meanTwoSided(from - tau0!, to - tau0!, tc! / 2, sigma),
  atZero: { parameter: 0, offset: 1, slope: 1 },
  linewidth: { parameter: 1, factor: 1e12 / Math.PI },
}

/** Chaotic light of a Gaussian line: 1 + beta exp(-pi (x/tc)^2). Line FWHM = sqrt(2 ln 2/pi)/tc. */
export const chaoticGaussian: FitModel = {
  name: 'chaotic-gaussian',
  title: 'Chaotic light, Gaussian line',
  parameters,
  starts,
  mean: (from, to, sigma, [beta, tc, tau0]) =>
    1 + beta! * meanGaussian(from - tau0!, to - tau0!, tc! / Math.sqrt(2 * Math.PI), sigma),
  atZero: { parameter: 0, offset: 1, slope: 1 },
  linewidth: { parameter: 1, factor: 1e12 * Math.sqrt((2 * Math.LN2) / Math.PI) },
}
