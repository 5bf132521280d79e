import type { Note } from '../../definition.ts'
import { brief } from '../../notes/numbers.ts'
import { afterpulseNote, channelNotes, fewPairsNote, resolutionNote } from '../../notes/pair-notes.ts'
import { gapsOf } from '../../record/gaps.ts'
import type { PooledPairs } from '../../record/pooled.ts'
import type { HistogramShape } from './count.ts'
import type { CorrelationResult } from './definition.ts'
import { alternationNote, crosstalkNote, wideBinNote } from './histogram-notes.ts'

type Fit = NonNullable<CorrelationResult['fit']>

const POOR_P = 0.01
const POOR_SIGMAS = 4
const WIDE_RESPONSE = 0.5

/** What a reader of this correlation should know before believing it (physics.md section 8, definitions.md B15). */
export function notesOf(
  result: CorrelationResult,
  pooled: PooledPairs,
  shape: HistogramShape,
  norm: Float64Array,
): Note[] {
  const binPs = Number(shape.binPs)
  const zero = result.counts[shape.halfBins]!
  return [
    ...(norm[shape.halfBins]! > 0 ? [] : [noChance]),
    ...fewPairsNote(zero, `The bin of zero delay (${binPs} ps)`),
    ...(pooled.sameChannel ? selfNote(pooled, shape.a) : []),
    ...((result.g2ZeroCorrected?.value ?? 0) < 0 ? [belowZero] : []),
    ...blockNote(result),
    ...wideBinNote(result.g2, result.counts, shape.halfBins, binPs),
    ...resolutionNote(pooled, binPs, 'The bin'),
    ...alternationNote(result.counts, norm, shape.halfBins),
    ...(pooled.sameChannel ? [] : crosstalkNote(result.counts, shape.halfBins, (k) => k * binPs)),
    ...(result.fit === null ? [] : fitNotes(result.fit, binPs)),
    ...channelNotes(pooled, shape.a, shape.b),
    ...afterpulseNote(pooled, shape.a),
  ]
}

const noChance: Note = {
  code: 'zero-denominator',
  detail: 'One of the channels has no tags: no pairs are expected by chance and g2 does not exist.',
}

const belowZero: Note = {
  code: 'below-zero',
  detail:
    'The corrected g2(0) is below zero: more background was taken out than there is. Check the signal fractions.',
}

/** One detector cannot see two photons within its dead time: the empty zero bin says nothing about the light. */
function selfNote(pooled: PooledPairs, channel: number): Note[] {
  const gaps = pooled.inputs.map(({ timesA }) => gapsOf(timesA).smallestPs ?? 0)
  return [
    {
      code: 'same-detector',
      detail: `Channel ${channel} is correlated with itself, and its smallest gap is ${Math.min(...gaps)} ps: at shorter delays g2 is 0 by construction of the detector. This is no antibunching.`,
    },
  ]
}

function blockNote({ blockU, g2Zero }: CorrelationResult): Note[] {
  if (blockU === null || g2Zero.u === null || blockU <= 1.5 * g2Zero.u) return []
  return [
    {
      code: 'block-scatter',
      detail: `Over ten blocks of the run g2(0) scatters by ${brief(blockU)}, more than 1.5 times its u of ${brief(g2Zero.u)}: drift, blinking or intensity noise adds to the counting statistics.`,
    },
  ]
}

function fitNotes(fit: Fit, binPs: number): Note[] {
  if (!fit.converged) {
    return [
      {
        code: 'not-converged',
        detail: `The ${fit.model} fit did not converge: ${reasonText(fit.reason)}. No parameter is reported.`,
      },
    ]
  }
  return [
    ...fit.atBound.map((name) => ({
      code: 'at-bound',
      detail: `The fit ends on the physical bound of ${name}: it is held there and quoted as a limit, where the deviance has risen by 1.`,
    })),
    ...qualityNote(fit),
    ...dipNote(fit, binPs),
    ...responseNote(fit),
  ]
}

function reasonText(reason: string | null): string {
  return reason === 'bound'
    ? 'a parameter ran into a bound that has no meaning for it'
    : (reason ?? 'no reason is known')
}

/** chi2/dof says that the model or the errors are wrong. With few counts a bin chi2 scatters by 2 + 1/m per bin. */
function qualityNote(fit: Fit): Note[] {
  const { chi2, dof, pValue } = fit
  if (chi2 === null || dof <= 0) return []
  const poor = pValue === null ? chi2 - dof > POOR_SIGMAS * Math.sqrt(3 * dof) : pValue < POOR_P
  if (!poor) return []
  const p = pValue === null ? '' : `, p = ${brief(pValue)}`
  return [
    {
      code: 'fit-quality',
      detail: `chi2/dof = ${brief(chi2 / dof)} with ${dof} degrees of freedom${p}: the ${fit.model} model does not describe the data, or counts vary more than Poisson counts do.`,
    },
  ]
}

/** g2(0) of the bin is averaged over more than a third of the dip, whose full width at half depth is 2 ln 2 t1. */
function dipNote(fit: Fit, binPs: number): Note[] {
  const t1 = fit.parameters.t1?.value
  if (t1 === undefined || t1 === null || fit.g2Zero === undefined) return []
  const width = 2 * Math.LN2 * t1
  if (binPs <= width / 3) return []
  return [
    {
      code: 'wide-bin',
      detail: `The bin of ${binPs} ps is wider than a third of the dip, which is ${brief(width)} ps wide at half depth: g2(0) of the bin is too high, that of the fit is averaged over the bin.`,
    },
  ]
}

function responseNote(fit: Fit): Note[] {
  const t1 = fit.parameters.t1?.value
  if (t1 === undefined || t1 === null || fit.responseFwhmPs <= WIDE_RESPONSE * t1) return []
  return [
    {
      code: 'wide-response',
      detail: `The timing response of ${fit.responseFwhmPs} ps is wider than half of t1 = ${brief(t1)} ps: the fit rests on the shape of the response.`,
    },
  ]
}
