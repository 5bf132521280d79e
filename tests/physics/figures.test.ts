import { beforeAll, describe, expect, it } from 'vitest'
import { figureSchema, type Figure } from '../../server/contract/figure.ts'
import { figureAt, figuresOf } from '../../server/physics/figures.ts'
import { renderSvg } from '../../server/physics/figure-svg/render-svg.ts'
import { kindDefinition } from '../../server/physics/registry.ts'
import { figureCsv } from '../../server/physics/table-csv.ts'
import { readReferenceTags } from './reference-tags.ts'
import { runKind } from './run-kind.ts'

async function pictureOf(kind: string, parameters: unknown, name: string) {
  const { result } = await runKind<Record<string, unknown>>(kind, parameters, readReferenceTags(name))
  const { figure } = await kindDefinition(kind).loadFigure()
  return { result, figure: figure(result, parameters)! }
}

const correlationParameters = { a: 1, b: 2, binPs: 500, halfRangePs: 60000, fit: { model: 'two-level' } }

describe('figures of a result (definitions.md, end)', () => {
  it('singles: rates of each channel in turn, source rates only where corrected', async () => {
    const parameters = { darkRates: { 2: { value: 100, u: 5 } } }
    const { result } = await pictureOf('singles', parameters, 'emitter-cw')
    const figures = figuresOf('singles', result)
    expect(figures.map((f) => f.pointer)).toEqual([
      '/channels/0/rate',
      '/channels/1/rate',
      '/channels/1/sourceRate',
    ])
    expect(figures[0]).toMatchObject({ label: 'R ch 1', unit: 'cps' })
    expect(figures[0]!.u).toBeGreaterThan(0)
  })

  it('coincidences: in the order of the table, accidentals those used', async () => {
    const parameters = { a: 0, b: 1, windowPs: 2000, delayPs: 5000, offPeakWindows: 5, offPeakStepPs: 100000 }
    const { result } = await pictureOf('coincidences', parameters, 'heralded')
    expect(figuresOf('coincidences', result).map((f) => f.pointer)).toEqual([
      '/rate',
      '/trueRate',
      '/accidentals/offPeak',
      '/car',
      '/g2',
      '/klyshko/a',
      '/klyshko/b',
    ])
  })

  it('correlation: bin, fit, then the parameters in the order of the model', async () => {
    const { result } = await pictureOf('correlation', correlationParameters, 'emitter-cw')
    expect(figuresOf('correlation', result).map((f) => f.pointer)).toEqual([
      '/g2Zero',
      '/fit/g2Zero',
      '/fit/parameters/g0',
      '/fit/parameters/t1',
      '/fit/parameters/tau0',
    ])
  })

  it('a pointer that leads nowhere, or to null, gives no figure', () => {
    const result = { a: { value: null, u: null, unit: '1' }, 'b/c': { value: 2, u: 0.1, unit: 'ps' }, d: [7] }
    expect(figureAt(result, '/a')).toBeNull()
    expect(figureAt(result, '/x/y')).toBeNull()
    expect(figureAt(result, '/b~1c')).toEqual({ value: 2, u: 0.1, unit: 'ps' })
    expect(figureAt(result, '/d/0')).toEqual({ value: 7, u: null, unit: '1' })
  })
})

describe('pictures', () => {
  let figure: Figure
  let result: Record<string, unknown>
  beforeAll(async () => {
    ;({ figure, result } = await pictureOf('correlation', correlationParameters, 'emitter-cw'))
  })

  it('follow the contract of figures, for each kind', async () => {
    figureSchema.parse(figure)
    figureSchema.parse((await pictureOf('singles', {}, 'heralded')).figure)
    const windows = { a: 1, b: 2, windowPs: 2000, offPeakWindows: 5, offPeakStepPs: 100000 }
    figureSchema.parse((await pictureOf('coincidences', windows, 'emitter-cw')).figure)
    expect((await pictureOf('coincidences', { a: 1, b: 2, windowPs: 2000 }, 'emitter-cw')).figure).toBeNull()
  })

  it('correlation: bars from 0 at no counts, Garwood below ten, sqrt(n) from ten on', () => {
    const points = figure.panels[0]!.series.find((s) => s.mark === 'points')!
    const r = result as { counts: number[]; g2: number[]; u: number[]; g2Low: number[]; g2Up: number[] }
    const empty = r.counts.indexOf(0)
    expect([points.y[empty], points.low![empty], points.high![empty]]).toEqual([0, 0, r.g2Up[empty]])
    const few = r.counts.findIndex((n) => n > 0 && n < 10)
    expect([points.low![few], points.high![few]]).toEqual([r.g2Low[few], r.g2Up[few]])
    const many = r.counts.findIndex((n) => n >= 10)
    expect(points.high![many]).toBeCloseTo(r.g2[many]! + r.u[many]!, 12)
    expect(figure.panels[1]!.ground).toEqual([-2, 2])
    expect(figure.panels[0]!.references.map((x) => x.at)).toEqual([1, 0.5, 0])
  })

  it('a bunched source gets no one-emitter limit, and a failed fit is not drawn', async () => {
    const chaotic = { a: 1, b: 2, binPs: 200000, halfRangePs: 4000000, fit: { model: 'chaotic-lorentzian' } }
    const bunched = (await pictureOf('correlation', chaotic, 'chaotic')).figure
    expect(bunched.panels[0]!.references.map((x) => x.at)).toEqual([1, 0])
    const failed = structuredClone(result) as { fit: { converged: boolean } }
    failed.fit.converged = false
    const { figure: draw } = await kindDefinition('correlation').loadFigure()
    const drawn = draw(failed, correlationParameters)!
    expect(drawn.panels.length).toBe(1)
    expect(drawn.panels[0]!.series.map((s) => s.mark)).toEqual(['points'])
    expect(drawn.description).toContain('did not converge')
  })

  it('the SVG stands alone, names itself, draws every bin, and is the same every time', () => {
    const svg = renderSvg(figure)
    expect(
      svg.startsWith('<?xml version="1.0" encoding="UTF-8"?>\n<svg xmlns="http://www.w3.org/2000/svg"'),
    ).toBe(true)
    expect(svg).toContain('role="img"')
    expect(svg).toContain(`<desc id="figure-description">${figure.description}</desc>`)
    expect(svg).not.toMatch(/NaN|undefined|Infinity|<style|<script|href/)
    expect(svg.match(/r="2.3"/g)!.length).toBe((result.counts as number[]).length)
    expect(renderSvg(structuredClone(figure))).toBe(svg)
    // Print: no hue anywhere (look.md section 9).
    for (const [, r, g, b] of svg.matchAll(/#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})/g))
      expect([g, b]).toEqual([r, r])
  })

  it('points beyond the frame become arrowheads at its edge', () => {
    const beyond = structuredClone(figure)
    beyond.panels[1]!.series[0]!.y[3] = 9
    const heads = (svg: string) => svg.match(/fill="#777777"/g)?.length ?? 0
    expect(heads(renderSvg(beyond))).toBe(heads(renderSvg(figure)) + 1)
  })

  it('text is escaped', () => {
    expect(renderSvg({ ...figure, title: 'a < b & "c"' })).toContain('>a &lt; b &amp; &quot;c&quot;</title>')
  })

  it('the CSV holds the table with full digits: header of name / unit, a row a line, LF', () => {
    const lines = figureCsv(figure).split('\n')
    expect(lines[0]).toBe(
      'delay / ps,counts / 1,g2 / 1,u(g2) / 1,g2 low / 1,g2 up / 1,fit / 1,u(fit) / 1,residual / σ',
    )
    expect(lines.length).toBe((result.counts as number[]).length + 2)
    expect(lines.at(-1)).toBe('')
    const first = lines[1]!.split(',')
    expect(first[0]).toBe('-60000')
    expect(Number(first[2])).toBe((result.g2 as number[])[0])
    const quoted = {
      ...figure,
      table: { columns: [{ name: 'a,b', unit: '1' }], rows: [['say "x"'], [null]] },
    }
    expect(figureCsv(quoted)).toBe('"a,b / 1"\n"say ""x"""\n\n')
  })
})
