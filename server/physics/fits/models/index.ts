import type { FitModel } from '../model.ts'
import { chaoticGaussian, chaoticLorentzian } from './chaotic.ts'
import { coherent } from './coherent.ts'
import { decay } from './decay.ts'
import { driven } from './driven.ts'
import { threeLevel } from './three-level.ts'
import { twoLevel } from './two-level.ts'

export const fitModels = {
  'two-level': twoLevel,
  'three-level': threeLevel,
  driven,
  'chaotic-lorentzian': chaoticLorentzian,
  'chaotic-gaussian': chaoticGaussian,
  coherent,
  decay,
} satisfies Record<string, FitModel>

export type FitModelName = keyof typeof fitModels
export const fitModelNames = Object.keys(fitModels) as [FitModelName, ...FitModelName[]]
