import { readFileSync } from 'node:fs'
import { beforeAll, describe, expect, inject, test } from 'vitest'
import type { Calculation } from '../../server/contract/calculations.ts'
import type { Entry } from '../../server/contract/entries.ts'
import type { RawFile } from '../../server/contract/files.ts'
import type { Notebook } from '../../server/contract/notebooks.ts'
import type { ProblemBody } from '../../server/contract/problems.ts'
import { referencePath } from '../support/reference.ts'
import { signIn, type PersonClient } from '../support/session.ts'

// Counts and g2 of an independent program over the same records (reference/tags/expected.json).
const expected = JSON.parse(readFileSync(referencePath('tags/expected.json'), 'utf8'))
const url = inject('url')

let maren: PersonClient
let entry: Entry

async function upload(name: string): Promise<RawFile> {
  const data = new FormData()
  data.set('file', new Blob([readFileSync(referencePath(`tags/${name}.csv`))]), `${name}.csv`)
  return maren.ok<RawFile>('POST', `entries/${entry.id}/files`, data)
}

function over(calculation: Calculation): boolean {
  return ['done', 'failed', 'cancelled'].includes(calculation.status)
}

async function finished(started: Calculation): Promise<Calculation> {
  let calculation = started
  for (let attempt = 0; attempt < 300 && !over(calculation); attempt++) {
    await new Promise((resolve) => setTimeout(resolve, 100))
    calculation = await maren.ok<Calculation>('GET', `calculations/${started.id}`)
  }
  return calculation
}

async function calculate(kind: string, fileId: string, parameters: object): Promise<Calculation> {
  const started = await maren.ok<Calculation>('POST', `entries/${entry.id}/calculations`, { kind, inputs: [{ fileId }], parameters })
  const done = await finished(started)
  expect(done.status, JSON.stringify(done.error)).toBe('done')
  return done
}

beforeAll(async () => {
  maren = await signIn(url, 'maren')
  const notebook = await maren.ok<Notebook>('POST', 'notebooks', { title: 'Calculations under test' })
  entry = await maren.ok<Entry>('POST', `notebooks/${notebook.id}/entries`, { title: 'Calculations' })
})

describe.each(Object.keys(expected))('reference record %s', (name) => {
  let file: RawFile
  beforeAll(async () => {
    file = await upload(name)
  })

  test('singles', async () => {
    const { result } = await calculate('singles', file.id, {})
    const channels = result?.channels as { channel: number; counts: number; rate: { value: number } }[]
    expect(Object.fromEntries(channels.map((c) => [String(c.channel), c.counts]))).toEqual(expected[name].counts)
    for (const { channel, rate } of channels)
      expect(rate.value / (expected[name].counts[channel] / (expected[name].durationPs * 1e-12))).toBeCloseTo(1, 12)
  })

  test('correlation, every bin', async () => {
    for (const { counts, g2, delaysPs, ...given } of expected[name].correlation ?? []) {
      const { a, b, binPs, halfRangePs, offsetPs } = given
      const { result } = await calculate('correlation', file.id, { a, b, binPs, halfRangePs, offsetPs })
      expect(result?.counts).toEqual(counts)
      expect(result?.delaysPs).toEqual(delaysPs)
      for (const [k, value] of (g2 as number[]).entries()) expect((result?.g2 as number[])[k]).toBeCloseTo(value, 8)
    }
  })

  test('coincidences', async () => {
    for (const want of expected[name].coincidences ?? []) {
      const { a, b, windowPs, delayPs, offPeakWindows, offPeakStepPs } = want
      const { result } = await calculate('coincidences', file.id, { a, b, windowPs, delayPs, offPeakWindows, offPeakStepPs })
      expect(result?.counts).toBe(want.counts)
      const accidentals = result?.accidentals as { product: { value: number }; offPeak: { value: number } }
      expect(accidentals.product.value / want.accidentalsProduct).toBeCloseTo(1, 9)
      expect(accidentals.offPeak.value / want.accidentalsOffPeak).toBeCloseTo(1, 9)
      expect((result?.g2 as { value: number }).value / want.g2).toBeCloseTo(1, 9)
    }
  })
})

describe('life of a calculation', () => {
  let file: RawFile
  beforeAll(async () => {
    file = await upload('emitter-cw')
  })
  const correlation = (binPs: number) => ({ a: 1, b: 2, binPs, halfRangePs: 60_000, fit: { model: 'two-level' } })

  test('the fit recovers the simulated lifetime within three standard uncertainties', async () => {
    const { result, figures, notes, provenance } = await calculate('correlation', file.id, correlation(500))
    const { converged, parameters } = result?.fit as { converged: boolean; parameters: Record<string, { value: number; u: number }> }
    expect(converged).toBe(true)
    const t1 = parameters.t1 as { value: number; u: number }
    expect(Math.abs(t1.value - expected['emitter-cw'].truth.t1Ps)).toBeLessThan(3 * t1.u)
    expect(figures.map((figure) => figure.pointer)).toContain('/fit/parameters/t1')
    expect(provenance?.inputs[0]?.sha256).toBe(file.sha256)
    expect(Array.isArray(notes)).toBe(true)
  })

  test('the same question again is answered at once, by its own calculation', async () => {
    const first = await calculate('correlation', file.id, correlation(400))
    const again = await maren.call<Calculation>('POST', `entries/${entry.id}/calculations`, {
      kind: 'correlation',
      inputs: [{ fileId: file.id }],
      parameters: correlation(400),
    })
    expect([again.status, again.json.status, again.json.resultSha256]).toEqual([201, 'done', first.resultSha256])
    expect(again.json.id).not.toBe(first.id)
  })

  test('other parameters give a successor with the same label; the first stays as it was', async () => {
    const first = await calculate('correlation', file.id, correlation(800))
    const next = await finished(
      await maren.ok<Calculation>('POST', `calculations/${first.id}/successors`, { parameters: correlation(1000) }),
    )
    expect([next.label, next.status]).toEqual([first.label, 'done'])
    expect(next.id).not.toBe(first.id)
    expect(await maren.ok<Calculation>('GET', `calculations/${first.id}`)).toEqual(first)
  })

  test('progress and outcome arrive as server-sent events', async () => {
    const started = await maren.ok<Calculation>('POST', `entries/${entry.id}/calculations`, {
      kind: 'correlation',
      inputs: [{ fileId: file.id }],
      parameters: correlation(333),
    })
    const answer = await fetch(`${url}/api/v1/calculations/${started.id}/events`, { headers: { cookie: maren.cookies() } })
    expect(answer.headers.get('content-type')).toContain('text/event-stream')
    const text = await answer.text()
    expect(text).toMatch(/event: outcome\ndata: .*"status":"done"/)
  })

  test('figure, CSV and SVG show the same points', async () => {
    const { id } = await calculate('correlation', file.id, correlation(500))
    const figure = await maren.ok<{ table: { rows: unknown[] } }>('GET', `calculations/${id}/figure`)
    const csv = (await maren.call('GET', `calculations/${id}/result.csv`)).bytes.toString('utf8')
    const svg = await maren.call('GET', `calculations/${id}/figure.svg`)
    expect(csv.trim().split('\n').length).toBe(figure.table.rows.length + 1)
    expect(svg.headers.get('content-type')).toContain('image/svg+xml')
    expect(svg.bytes.toString('utf8')).toMatch(/<svg[^>]* role="img"/)
  })

  test('what cannot be computed is refused by field, and an unknown kind by name', async () => {
    const bad = await maren.call<ProblemBody>('POST', `entries/${entry.id}/calculations`, {
      kind: 'correlation',
      inputs: [{ fileId: file.id }],
      parameters: { a: 1, b: 2, binPs: 0, halfRangePs: 100 },
    })
    expect([bad.status, bad.json.errors?.[0]?.pointer]).toEqual([422, '/parameters/binPs'])
    const unknown = await maren.call<ProblemBody>('POST', `entries/${entry.id}/calculations`, { kind: 'guess', inputs: [], parameters: {} })
    expect(unknown.status).toBe(422)
  })

  test('a finished calculation cannot be stopped, a cancelled one never gets a result', async () => {
    const done = await calculate('singles', file.id, {})
    expect((await maren.call('DELETE', `calculations/${done.id}`)).status).toBe(409)
    const started = await maren.ok<Calculation>('POST', `entries/${entry.id}/calculations`, {
      kind: 'correlation',
      inputs: [{ fileId: file.id }],
      parameters: { a: 1, b: 2, binPs: 500, halfRangePs: 50_000_000 },
    })
    const stopped = await maren.call<Calculation>('DELETE', `calculations/${started.id}`)
    const end = await finished(started)
    if (stopped.status === 200) expect([end.status, end.result]).toEqual(['cancelled', null])
    else expect(end.status).toBe('done')
  })

  test('a file that holds no tags is refused before anything is queued', async () => {
    const data = new FormData()
    data.set('file', new Blob([new Uint8Array([0, 1, 2, 255])]), 'picture.raw')
    const other = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, data)
    const refused = await maren.call<ProblemBody>('POST', `entries/${entry.id}/calculations`, {
      kind: 'singles',
      inputs: [{ fileId: other.id }],
      parameters: {},
    })
    expect(refused.status).toBe(422)
  })
})
