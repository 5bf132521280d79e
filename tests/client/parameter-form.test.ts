import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { z } from 'zod'
import { coincidences } from '../../server/physics/kinds/coincidences/definition.ts'
import { singles } from '../../server/physics/kinds/singles/definition.ts'
import type { JsonSchema } from '../../src/features/calculations/json-schema.ts'
import {
  parameterForm,
  pointerOf,
  withValue,
  type ParameterLeaf,
} from '../../src/features/calculations/parameter-fields.ts'
import { shifted, textOf, valueOf } from '../../src/features/calculations/parameter-text.ts'

const jsonSchemaOf = (schema: z.ZodType) => z.toJSONSchema(schema, { io: 'input' }) as JsonSchema
const pairs = jsonSchemaOf(coincidences.parameters)
const pairParameters = { a: 1, b: 2, windowPs: 2000, delayPs: 0, offPeakWindows: 10, offPeakStepPs: 100_000 }
const leaf = (form: ParameterLeaf['form'], value: unknown, unit?: string): ParameterLeaf => ({
  path: ['x'],
  label: 'X',
  help: undefined,
  unit,
  form,
  choices: [],
  value,
  optional: false,
  usual: false,
})

describe('fields from the schema of a kind', () => {
  test('given and defaulted values become fields with their titles, in the order of the schema', () => {
    const labels = parameterForm(pairs, pairParameters).given.map((field) => field.label)
    expect(labels.slice(0, 6)).toEqual([
      'Channel A',
      'Channel B',
      'Window',
      'Delay',
      'Off-peak windows',
      'Off-peak step',
    ])
    expect(labels).toContain('Dark rate A')
  })

  test('optional values that are not given can be added, with a value that the kind accepts', () => {
    const { absent } = parameterForm(pairs, pairParameters)
    const subtract = absent.find((each) => each.path[0] === 'subtract')
    expect(subtract).toMatchObject({ start: 'offPeak', keyed: false })
    const added = withValue(pairParameters, subtract!.path, subtract!.start)
    expect(coincidences.parameters.safeParse(added).success).toBe(true)
  })

  test('maps by channel ask for a key and show what is given', () => {
    const parameters = { deadTimes: { '1': { ps: 45_000, uPs: 0, kind: 'non-extending' } } }
    const form = parameterForm(jsonSchemaOf(singles.parameters), parameters)
    expect(form.given.map(({ label, form: kind }) => [label, kind])).toEqual([
      ['Dead time 1', 'time'],
      ['Standard uncertainty 1', 'time'],
      ['Kind 1', 'choice'],
    ])
    expect(form.absent.find((each) => each.path[0] === 'darkRates')?.keyed).toBe(true)
  })

  test('an optional group with alternatives starts with the first and shows the one in use', () => {
    const schema = jsonSchemaOf(
      z.strictObject({
        fit: z
          .union([
            z.strictObject({
              model: z.literal('two-level'),
              level: z.enum(['fixed', 'free']).default('fixed'),
            }),
            z.strictObject({ model: z.literal('decay'), from: z.number() }),
          ])
          .optional()
          .meta({ title: 'Fit' }),
      }),
    )
    expect(parameterForm(schema, {}).absent[0]?.start).toEqual({ model: 'two-level' })
    expect(
      parameterForm(schema, { fit: { model: 'decay', from: 3 } }).given.map((field) => field.path),
    ).toEqual([['fit', 'from']])
  })
})

describe('changing a value', () => {
  test('the rest stays, in its order, and the original too', () => {
    const changed = withValue(pairParameters, ['windowPs'], 2001)
    expect(Object.keys(changed)).toEqual(Object.keys(pairParameters))
    expect(changed.windowPs).toBe(2001)
    expect(pairParameters.windowPs).toBe(2000)
    expect(withValue(pairParameters, ['offPeakStepPs'], undefined)).not.toHaveProperty('offPeakStepPs')
    expect(withValue({}, ['fit', 'model'], 'decay')).toEqual({ fit: { model: 'decay' } })
  })

  test('pointers name a field as the server does (RFC 6901)', () => {
    expect(pointerOf(['darkRates', 'a/b', 'm~n'])).toBe('/parameters/darkRates/a~1b/m~0n')
  })
})

describe('times', () => {
  test('are shown in the unit that suits and read back in it', () => {
    expect(textOf(leaf('whole-time', 500, 'ps'))).toEqual({ text: '500', unit: 'ps' })
    expect(textOf(leaf('whole-time', 2001, 'ps'))).toEqual({ text: '2.001', unit: 'ns' })
    expect(textOf(leaf('whole-time', '600000000000000', 'ps'))).toEqual({ text: '600', unit: 's' })
    expect(valueOf(leaf('whole-time', 2001, 'ps'), '2.5')).toEqual({ value: 2500 })
    expect(valueOf(leaf('whole-time', 2001, 'ps'), '500 ps')).toEqual({ value: 500 })
    expect(valueOf(leaf('whole-time', 2001, 'ps'), '−1,5 ns')).toEqual({ value: -1500 })
  })

  test('parts of a picosecond and words are refused with a sentence', () => {
    expect(valueOf(leaf('whole-time', 2000, 'ps'), '0.0005')).toEqual({
      refusal: 'Times are whole picoseconds.',
    })
    expect(valueOf(leaf('whole-time', 2000, 'ps'), 'wide')).toHaveProperty('refusal')
    expect(valueOf(leaf('time', 350, 'ps'), '350.5 ps')).toEqual({ value: 350.5 })
  })

  test('beyond 2^53 they stay exact, as text', () => {
    expect(valueOf(leaf('whole-time', 1e15, 'ps'), '9007.199254740993 s')).toEqual({
      value: '9007199254740993',
    })
  })

  test('any whole time survives being shown and read', () => {
    fc.assert(
      fc.property(fc.bigInt({ min: -(2n ** 61n), max: 2n ** 61n }), (ps) => {
        const value = Number.isSafeInteger(Number(ps)) ? Number(ps) : String(ps)
        const field = leaf('whole-time', value, 'ps')
        expect(valueOf(field, textOf(field).text)).toEqual({ value })
      }),
    )
  })

  test('moving the point loses nothing', () => {
    expect([
      shifted('2.5', 3),
      shifted('500', -3),
      shifted('1e-3', 3),
      shifted('-0.25', 2),
      shifted('0', -3),
    ]).toEqual(['2500', '0.5', '1', '-25', '0'])
  })
})

describe('other values', () => {
  test.each([
    ['integer', '7', { value: 7 }],
    ['quantity', '87 ± 4', { value: { value: 87, u: 4, unit: 'cps' } }],
    ['quantity', '87', { value: { value: 87, u: 0, unit: 'cps' } }],
    ['number', '0,5', { value: 0.5 }],
    ['integers', '1, 2; 4', { value: [1, 2, 4] }],
    ['json', '[[0,1]]', { value: [[0, 1]] }],
    ['json', 'plain words', { value: 'plain words' }],
    ['yes-no', 'yes', { value: true }],
  ] as const)('%s %s', (form, text, expected) =>
    expect(valueOf(leaf(form, { unit: 'cps' }), text)).toEqual(expected),
  )

  test.each([
    ['integer', '1.5'],
    ['number', 'many'],
    ['integers', '1, two'],
    ['quantity', '87 ± 4 ± 1'],
  ] as const)('%s refuses %s', (form, text) => {
    expect(valueOf(leaf(form, null), text)).toHaveProperty('refusal')
  })
})
