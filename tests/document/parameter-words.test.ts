import { expect, test } from 'vitest'
import { parameterWords } from '../../server/features/evidence/parameter-words.ts'
import { kindDefinition, parametersJsonSchema, parseParameters } from '../../server/physics/registry.ts'

function printed(kind: string, given: Record<string, unknown>): string {
  const definition = kindDefinition(kind)
  return parameterWords(parametersJsonSchema(definition), parseParameters(definition, given))
}

test('parameters of a fit are printed with their titles and units', () => {
  const words = printed('correlation', {
    a: 1,
    b: 2,
    binPs: 500,
    halfRangePs: 30_000,
    fit: { model: 'two-level', responseFwhmPs: 520 },
  })
  expect(words).toContain('Bin 500 ps')
  expect(words).toContain('Fit (Model two-level, Timing response 520 ps, Level fixed)')
})

test('quantities are printed with uncertainty and unit', () => {
  const words = printed('coincidences', {
    a: 1,
    b: 2,
    windowPs: 2001,
    delayPs: 0,
    darkRates: { a: { value: 62, u: 3, unit: 'cps' } },
  })
  expect(words).toContain('Window 2001 ps')
  expect(words).toContain('Dark rate A 62 ± 3 cps')
})
