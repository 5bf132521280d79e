// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen, within } from '@testing-library/react'
import { afterEach, describe, expect, it } from 'vitest'
import { layoutFigure, ticksOf } from '../../src/plots/figure-layout.ts'
import { FigurePlot } from '../../src/plots/figure-plot.tsx'
import { axisNumber, readoutNumber, withUncertainty } from '../../src/plots/numbers.ts'
import { readingAt, readSeries } from '../../src/plots/readout.ts'
import { errorBarPath, linePath, overflowPath, stemsPath } from '../../src/plots/series-path.ts'
import { ratesFigure, sampleFigure } from './sample-figure.ts'

afterEach(cleanup)

describe('figure plot', () => {
  it('is a picture with the one-sentence description', () => {
    const figure = sampleFigure()
    render(<FigurePlot figure={figure} />)
    expect(screen.getByRole('img', { name: figure.description })).toBeTruthy()
  })

  it('reads out x, y ± error and counts by arrow keys, from the middle outwards', () => {
    const figure = sampleFigure()
    render(<FigurePlot figure={figure} />)
    const stage = screen.getByRole('img')
    const readout = screen.getByRole('status')
    fireEvent.keyDown(stage, { key: 'ArrowRight' })
    const row = figure.table.rows[40]!
    expect(readout.textContent).toBe(
      `τ = 0 nsg(2)(τ) = ${withUncertainty(row[1] as number, row[2] as number)}${row[3]} counts`,
    )
    fireEvent.keyDown(stage, { key: 'ArrowRight' })
    expect(readout.textContent).toMatch(/^τ = 0\.5000 ns/)
    fireEvent.keyDown(stage, { key: 'Home' })
    expect(readout.textContent).toMatch(/^τ = −20\.00 ns/)
    fireEvent.blur(stage)
    expect(readout.textContent).toBe('')
  })

  it('reads out the point nearest to the pointer', () => {
    const figure = sampleFigure()
    const layout = layoutFigure(figure, 672)
    const { container } = render(<FigurePlot figure={figure} />)
    const svg = container.querySelector('.hs-plot-stage > svg')!
    fireEvent.pointerMove(svg, { clientX: layout.x(10.1) })
    expect(screen.getByRole('status').textContent).toMatch(/^τ = 10\.00 ns/)
  })

  it('opens a table with every row', () => {
    const figure = sampleFigure()
    render(<FigurePlot figure={figure} />)
    fireEvent.click(screen.getByRole('button', { name: 'Data table' }))
    const table = screen.getByRole('table')
    expect(within(table).getAllByRole('row')).toHaveLength(1 + figure.table.rows.length)
    expect(within(table).getByRole('columnheader', { name: 'delay / ns' })).toBeTruthy()
  })

  it('draws each series as one path however many points, so that a thousand stay fast', () => {
    const few = render(<FigurePlot figure={sampleFigure(81)} />).container.querySelectorAll('path').length
    cleanup()
    const many = render(<FigurePlot figure={sampleFigure(1001)} />).container.querySelectorAll('path').length
    expect(many).toBe(few)
  })

  it('tells channels apart by markers as well as by lines', () => {
    const { container } = render(<FigurePlot figure={ratesFigure()} />)
    const marks = container.querySelector('.hs-mark-channel-2')?.getAttribute('d') ?? ''
    expect(marks.match(/M/g)).toHaveLength(6)
  })
})

describe('figure layout', () => {
  it('sets the axes 8 px off the data and gives the residuals a strip of 54 px on the same x scale', () => {
    const layout = layoutFigure(sampleFigure(), 672)
    expect(layout.left).toBe(50)
    expect(layout.right).toBe(658)
    const [main, strip] = layout.panels
    expect(main?.height).toBe(232)
    expect(strip).toMatchObject({ strip: true, height: 54 })
    expect(layout.axisTop).toBe(strip!.top + 54 + 8)
    expect(layout.x(0)).toBe(354)
  })

  it('labels decades on a logarithmic axis', () => {
    const figure = sampleFigure()
    figure.x = { ...figure.x, scale: 'log', domain: [1, 1e6] }
    const layout = layoutFigure(figure, 672)
    const texts = ticksOf(layout.x, figure.x, 8).flatMap((tick) => tick.text ?? [])
    expect(texts).toEqual(['1', '10', '100', '1000', '10⁴', '10⁵', '10⁶'])
  })

  it('has room for a single value and for none', () => {
    const figure = sampleFigure(1)
    figure.panels = figure.panels.map((panel) => ({
      ...panel,
      y: { ...panel.y, domain: null },
      references: [],
    }))
    figure.panels[0]!.series = [
      { label: 'one', mark: 'points', role: 'coincidence', x: [5], y: [3], low: null, high: null },
    ]
    figure.panels[1]!.series = []
    const { x, panels } = layoutFigure(figure, 672)
    expect(Number.isFinite(x(5))).toBe(true)
    expect(Number.isFinite(panels[0]!.y(3))).toBe(true)
    expect(Number.isFinite(panels[1]!.y(0.5))).toBe(true)
  })
})

describe('paths', () => {
  const { x, panels } = layoutFigure(sampleFigure(), 672)
  const y = panels[0]!.y
  const series = (values: (number | null)[], low?: number[], high?: number[]) => ({
    label: 's',
    mark: 'points' as const,
    role: 'coincidence' as const,
    x: values.map((_, at) => at),
    y: values,
    low: low ?? null,
    high: high ?? null,
  })

  it('leaves a gap in a line at a null', () => {
    expect(linePath(series([1, 1, null, 1, 1]), x, y).match(/M/g)).toHaveLength(2)
  })

  it('caps error bars below 40 points only', () => {
    const ones = (count: number) => Array.from({ length: count }, () => 1)
    expect(errorBarPath(series(ones(3), ones(3), ones(3)), x, y)).toContain('h6')
    expect(errorBarPath(series(ones(40), ones(40), ones(40)), x, y)).not.toContain('h6')
  })

  it('points an arrowhead at what lies beyond the frame', () => {
    expect(overflowPath(series([1, 9]), x, y).match(/Z/g)).toHaveLength(1)
  })

  it('cuts a stem at the frame', () => {
    const strip = panels[1]!
    expect(stemsPath(series([9]), x, strip.y)).toContain(`V${strip.top}`)
  })
})

describe('read-out', () => {
  // JCGM 100:2008, 7.2.6: uncertainty to at most two digits, the value to the same place.
  it.each([
    [0.08312, 0.01134, '0.083 ± 0.011'],
    [41283.4, 8.2, '41\u2009283.4 ± 8.2'],
    [-12.4, 0.05, '−12.400 ± 0.050'],
    [-41283, 12, '−41\u2009283 ± 12'],
    [250, null, '250.0'],
  ])('sets %d with %d', (value, u, text) => {
    expect(withUncertainty(value, u)).toBe(text)
  })

  it('gives both ends where an error is lopsided, as with few counts', () => {
    const figure = sampleFigure()
    const series = readSeries(figure)!
    const reading = readingAt(
      figure,
      { ...series, low: series.y.map(() => 0), high: series.y.map(() => 3) },
      0,
    )
    expect(reading?.parts[1]?.text).toMatch(/\(0 to 3\.000\)/)
  })

  it('groups thousands before the point alone', () => {
    expect(axisNumber('24769800.123456')).toBe('24\u2009769\u2009800.123456')
    expect(axisNumber('0.1234567')).toBe('0.1234567')
  })

  it('writes very small and very large numbers with a power of ten', () => {
    expect(readoutNumber(1.5e-6)).toBe('1.500 × 10⁻⁶')
  })
})
