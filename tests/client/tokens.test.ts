import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'

const root = join(import.meta.dirname, '..', '..')
const tokens = readFileSync(join(root, 'src/styles/tokens.css'), 'utf8')

/** Declarations of the rule whose selector list contains `selector`, as name → value. */
function rule(selector: string): Map<string, string> {
  const bare = tokens.replace(/\/\*[\s\S]*?\*\//g, '')
  for (const [, selectors = '', body = ''] of bare.matchAll(/([^{}]+)\{([^{}]*)\}/g)) {
    const listed = selectors.split(',').map((each) => each.trim().replaceAll('"', "'"))
    if (!listed.includes(selector)) continue
    const pairs = body.split(';').map((each) => each.split(/:([\s\S]*)/))
    return new Map(pairs.flatMap(([name, value]) => (name && value ? [[name.trim(), value.trim()]] : [])))
  }
  throw new Error(`No rule for ${selector} in tokens.css`)
}

/** Relative luminance and contrast ratio by WCAG 2.2, definitions of those terms. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4))
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

function contrast(one: string, other: string): number {
  const [light = 0, dark = 0] = [luminance(one), luminance(other)].sort((a, b) => b - a)
  return (light + 0.05) / (dark + 0.05)
}

const papers = ['paper', 'margin', 'well', 'lift', 'table']

/** Text on its grounds: at least 4.5:1 (WCAG 1.4.3). */
const textPairs: [string, string[]][] = [
  ['ink', [...papers, 'rail', 'carrier', 'act-soft', 'good-soft', 'warn-soft', 'fault-soft']],
  ['ink2', [...papers, 'rail', 'carrier', 'act-soft', 'good-soft', 'warn-soft', 'fault-soft']],
  ['ink3', [...papers, 'rail']],
  ['act', [...papers, 'warn-soft', 'fault-soft']],
  ['on-act', ['act', 'act-hi']],
  ['paper', ['ink']],
  ['good', ['paper', 'margin', 'good-soft']],
  ['warn', ['paper', 'margin', 'warn-soft', 'act-soft']],
  ['fault', ['paper', 'margin', 'lift', 'table', 'fault-soft']],
  ['ch1', ['paper', 'table']],
  ['ch2', ['paper', 'table']],
  ['ch3', ['paper', 'table']],
  ['ch4', ['paper', 'table']],
]

/** Edges of controls, focus rings, axes and data marks: at least 3:1 (WCAG 1.4.11). */
const edgePairs: [string, string[]][] = [
  ['line', ['paper', 'margin', 'lift', 'table']],
  ['focus', [...papers, 'rail']],
  ['acc', ['paper']],
  ['fit', ['paper']],
  ['chc', ['paper']],
  ['ink3', ['paper']],
  ['tick', ['rail']],
]

const rows = (pairs: [string, string[]][]) =>
  pairs.flatMap(([front, backs]) => backs.map((back) => [front, back] as const))

describe('contrast', () => {
  it('is measured as WCAG defines it', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 9)
    // Known pair: #767676 is the lightest grey that reaches 4.5:1 on white (common practice).
    expect(contrast('#767676', '#ffffff')).toBeGreaterThanOrEqual(4.5)
    expect(contrast('#777777', '#ffffff')).toBeLessThan(4.5)
  })

  for (const theme of ['day', 'dusk']) {
    const colours = rule(`[data-theme='${theme}']`)
    const colour = (name: string) => colours.get(`--hs-${name}`) ?? ''
    it.each(rows(textPairs))(`${theme}: %s on %s reads at 4.5:1`, (front, back) => {
      expect(contrast(colour(front), colour(back))).toBeGreaterThanOrEqual(4.5)
    })
    it.each(rows(edgePairs))(`${theme}: %s on %s shows at 3:1`, (front, back) => {
      expect(contrast(colour(front), colour(back))).toBeGreaterThanOrEqual(3)
    })
  }

  it('dark-room at level 3 reads at 4.5:1 too', () => {
    const usual = rule("[data-theme='darkroom']")
    const bright = rule("[data-theme='darkroom'][data-level='3']")
    const colour = (name: string) => bright.get(`--hs-${name}`) ?? usual.get(`--hs-${name}`) ?? ''
    for (const [front, back] of rows(textPairs.slice(0, 3))) {
      expect(contrast(colour(front), colour(back)), `${front} on ${back}`).toBeGreaterThanOrEqual(4.5)
    }
  })
})

describe('dark-room', () => {
  it.each([
    "[data-theme='darkroom']",
    "[data-theme='darkroom'][data-level='1']",
    "[data-theme='darkroom'][data-level='3']",
  ])('%s gives no green and no blue', (selector) => {
    const colours = [...rule(selector).values()].flatMap((value) => value.match(/#[0-9a-f]{6}/gi) ?? [])
    expect(colours.length).toBeGreaterThan(15)
    for (const colour of colours) expect(colour.slice(3)).toBe('0000')
    for (const value of rule(selector).values()) expect(value).not.toMatch(/rgb\((?!0 0 0)/)
  })
})

describe('colours live in tokens.css alone', () => {
  // The checker is a page of its own that goes into bundles and is opened without us: it has its own two colours.
  const files = readdirSync(join(root, 'src'), { recursive: true, encoding: 'utf8' })
    .filter(
      (file) => /\.(css|tsx?)$/.test(file) && !file.endsWith('tokens.css') && !file.includes('/checker/'),
    )
    .map((file) => join('src', file))

  it.each(files.filter((file) => file.endsWith('.css')))('%s', (file) => {
    const css = readFileSync(join(root, file), 'utf8').replace(/\/\*[\s\S]*?\*\//g, '')
    const values = [...css.matchAll(/:\s*([^;{}]+);/g)].map(([, value = '']) => value)
    for (const value of values)
      expect(value).not.toMatch(
        /#[0-9a-f]{3,8}\b|\b(rgb|hsl|oklch|oklab|lab)a?\(|\b(white|black|red|grey|gray|blue|green)\b/i,
      )
  })

  it('no component names one', () => {
    const naming =
      /["'`]#[0-9a-f]{6}["'`]|["'`]#[0-9a-f]{3}["'`]|(fill|stroke|color)=["'](white|black|red|grey|gray|blue|green|#)|rgba?\(/i
    const found = files.filter(
      (file) => /\.tsx?$/.test(file) && naming.test(readFileSync(join(root, file), 'utf8')),
    )
    expect(found).toEqual([])
  })

  it('the start-up script paints the grounds of the tokens, so that nothing flashes', () => {
    const page = readFileSync(join(root, 'index.html'), 'utf8')
    for (const theme of ['day', 'dusk', 'darkroom']) {
      expect(page).toContain(`${theme}: '${rule(`[data-theme='${theme}']`).get('--hs-table')}'`)
    }
  })
})
