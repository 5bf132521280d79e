import { describe, expect, test } from 'vitest'
import type { Entry } from '../../server/contract/entries.ts'
import { needsOf } from '../../src/features/bench/needs.ts'
import { labelParts } from '../../src/features/calculations/figure-label.ts'
import { beamNodes, hasFigures } from '../../src/features/runs/beam-figures.ts'
import { conditionFrom, lineOf } from '../../src/features/runs/condition-text.ts'
import { roughCount, sizeText, waitText } from '../../src/lib/format-quantity.ts'
import { durationText } from '../../src/lib/picoseconds.ts'

const figure = (label: string, value: string, u: string | null, unit = 'cps') => ({
  pointer: `/${label}`,
  label,
  value,
  u,
  unit,
})
const calculation = (label: string, figures: ReturnType<typeof figure>[], more: object = {}) => ({
  id: label,
  label,
  kind: 'any',
  status: 'done',
  stale: false,
  figures,
  ...more,
})

function entry(more: object): Entry {
  return {
    id: 'e1',
    number: 'N-01/001',
    title: 'Purity',
    phase: 'writing',
    authors: [{ personId: 'maren', name: 'Maren Adeyemi', signed: false }],
    updatedAt: '2026-11-12T10:00:00.000Z',
    calculations: [],
    blocks: [],
    allowed: ['edit', 'sign:authorship'],
    returned: null,
    ...more,
  } as unknown as Entry
}

describe('what needs a person', () => {
  const kinds = (...entries: Entry[]) => needsOf(entries, [], 'maren').map(({ key }) => key)

  test('a returned sheet, an outdated block, a sheet ready to sign; not the sheets of others', () => {
    expect(
      kinds(
        entry({ phase: 'returned', returned: { reason: 'r', by: 'Farid', at: '2026-11-12T10:00:00.000Z' } }),
      ),
    ).toEqual(['returned-e1'])
    expect(
      kinds(entry({ calculations: [calculation('C1', [], { stale: true })], blocks: [{ code: 'x' }] })),
    ).toEqual(['calculation-C1'])
    expect(kinds(entry({ calculations: [calculation('C1', [])] }))).toEqual(['sign-e1'])
    expect(kinds(entry({ calculations: [calculation('C1', [])], authors: [] }))).toEqual([])
  })

  test('a calculation whose successor is sound needs nothing', () => {
    const calculations = [calculation('C1', [], { status: 'failed' }), calculation('C1', [])]
    expect(kinds(entry({ calculations }))).toEqual(['sign-e1'])
  })
})

describe('figures at the beam path', () => {
  const measured = entry({
    calculations: [
      calculation('C1', [figure('R ch 3', '38917', '8'), figure('R ch 1', '41283', '8')]),
      calculation('C2', [figure('W2', '0.640', '0.033'), figure('accidentals', '3.213', '0.001')]),
      calculation('C3', [figure('W2', '9.9', null)], { stale: true }),
    ],
  })

  test('channels in order at the detectors, coincidences and accidentals; nothing that is out of date', () => {
    const nodes = beamNodes(measured, undefined, 'hbt')
    expect(nodes['detector-1']).toMatchObject({
      label: 'Channel 1, W',
      figure: '41\u2009283',
      more: '± 8 cps',
    })
    expect(nodes['detector-2']?.figure).toBe('38\u2009917')
    expect(nodes.coincidence?.figure).toBe('0.640')
    expect(nodes.extra?.figure).toBe('3.213')
  })

  test('without any the set-up is dark', () => {
    expect(hasFigures(beamNodes(entry({}), undefined, 'hbt'))).toBe(false)
  })
})

describe('labels of figures', () => {
  test.each([
    ['g2(0), bin', 'g^(2)(0)', ', bin'],
    ['t1', 't_1', ''],
    ['eta_A', 'η_A', ''],
    ['CAR', 'CAR', ''],
    ['R ch 1', 'R', ' ch 1'],
    ['true rate', null, 'true rate'],
    ['accidentals', null, 'accidentals'],
  ])('%s', (label, symbol, words) => expect(labelParts(label)).toEqual({ symbol, words }))
})

describe('conditions', () => {
  test('decimals stay as typed, with their uncertainty', () => {
    expect(conditionFrom({ name: 'temperature', value: '4.20 ± 0.1', unit: 'K' })).toEqual({
      name: 'temperature',
      value: '4.20',
      u: '0.1',
      unit: 'K',
    })
    expect(lineOf({ name: 'line', value: '915.3', u: null, unit: 'nm' })).toEqual({
      name: 'line',
      value: '915.3',
      unit: 'nm',
    })
  })
  test('words where a number belongs are refused, empty lines are nothing', () => {
    expect(conditionFrom({ name: 'drive', value: 'low', unit: '' })).toHaveProperty('refusal')
    expect(conditionFrom({ name: '', value: '', unit: 'K' })).toBeNull()
  })
})

describe('sizes and times', () => {
  test('as read at a glance', () => {
    expect([sizeText(999), sizeText(385_000_000), sizeText(999_600)]).toEqual(['999 B', '385 MB', '1.00 MB'])
    expect([roughCount(9075), roughCount(263_352), roughCount(48_100_000)]).toEqual([
      '9075',
      '263 k',
      '48.1 M',
    ])
    expect([waitText(40), waitText(130), waitText(3900)]).toEqual(['40 s', '2 min 10 s', '1 h 5 min'])
    expect([durationText('600000000000000'), durationText(500), durationText(1_999_990_000_000)]).toEqual([
      '600 s',
      '500 ps',
      '2 s',
    ])
  })
})
