import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import path from 'node:path'

const require = createRequire(import.meta.url)

interface Face {
  family: string
  file: string
  weight: string
  style?: 'normal' | 'italic'
  range?: string
}

const variable = (name: string, file: string) => `@fontsource-variable/${name}/files/${name}-${file}.woff2`
const latin = 'U+0000-02FF, U+1E00-1EFF, U+2000-206F, U+20AC, U+2190-21FF, U+2212'
const faces: readonly Face[] = [
  {
    family: 'Source Serif 4 Variable',
    file: variable('source-serif-4', 'latin-wght-normal'),
    weight: '200 900',
    range: latin,
  },
  {
    family: 'Source Serif 4 Variable',
    file: variable('source-serif-4', 'latin-wght-italic'),
    weight: '200 900',
    style: 'italic',
    range: latin,
  },
  {
    family: 'Source Serif 4 Variable',
    file: variable('source-serif-4', 'greek-wght-normal'),
    weight: '200 900',
    range: 'U+0370-03FF',
  },
  {
    family: 'Schibsted Grotesk Variable',
    file: variable('schibsted-grotesk', 'latin-wght-normal'),
    weight: '400 900',
    range: latin,
  },
  {
    family: 'Spline Sans Mono Variable',
    file: variable('spline-sans-mono', 'latin-wght-normal'),
    weight: '300 700',
    range: latin,
  },
]

let fonts: string | null = null
let maths: string | null = null

/** The typefaces of a print as CSS that needs nothing from outside. */
export function fontCss(): string {
  fonts ??= faces
    .map(({ family, file, weight, style = 'normal', range }) => {
      const unicodeRange = range ? `unicode-range:${range};` : ''
      return `@font-face{font-family:'${family}';font-style:${style};font-weight:${weight};${unicodeRange}src:url(${dataUrl(packageFile(file))}) format('woff2')}`
    })
    .join('\n')
  return fonts
}

/** The style of formulae with its typefaces inside; large, so only for sheets that hold a formula. */
export function mathsCss(): string {
  if (maths !== null) return maths
  const file = packageFile('katex/dist/katex.min.css')
  maths = readFileSync(file, 'utf8').replace(/src:[^;}]+/g, (sources) => {
    const woff2 = /url\((fonts\/[^)]+\.woff2)\)/.exec(sources)?.[1]
    return woff2 ? `src:url(${dataUrl(path.join(path.dirname(file), woff2))}) format("woff2")` : sources
  })
  return maths
}

function packageFile(name: string): string {
  const [scope = '', rest = ''] = name.startsWith('@') ? name.split('/').slice(0, 2) : [name.split('/')[0]]
  const home = rest ? `${scope}/${rest}` : scope
  return path.join(path.dirname(require.resolve(`${home}/package.json`)), name.slice(home.length + 1))
}

function dataUrl(file: string): string {
  return `data:font/woff2;base64,${readFileSync(file).toString('base64')}`
}
