import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { figuresOf } from '../../server/physics/figures.ts'
import {
  kindDefinition,
  kindDefinitions,
  parametersJsonSchema,
  parseParameters,
} from '../../server/physics/registry.ts'
import { readReferenceTags } from './reference-tags.ts'
import { runKind } from './run-kind.ts'

const root = resolve(import.meta.dirname, '../..')

const pageOf = (kind: string): string => readFileSync(join(root, 'docs/calculations', `${kind}.md`), 'utf8')

/** Codes in the first column of the table of quality notes. */
function notesOfPage(kind: string): string[] {
  const rows = pageOf(kind)
    .split('## Quality notes')[1]!
    .split('\n')
    .filter((row) => row.startsWith('| `'))
  return rows.flatMap((row) => [...row.split('|')[1]!.matchAll(/`([a-z0-9-]+)`/g)].map((m) => m[1]!))
}

/** All sources of the calculations in one text. */
const source = readdirSync(join(root, 'server/physics'), { recursive: true, encoding: 'utf8' })
  .filter((name) => name.endsWith('.ts'))
  .map((name) => readFileSync(join(root, 'server/physics', name), 'utf8'))
  .join('\n')

describe.each(kindDefinitions.map((d) => ({ kind: d.kind, definition: d })))(
  'kind $kind',
  ({ kind, definition }) => {
    it('has a folder with definition, compute and figure, a test and a docs page', () => {
      for (const file of ['definition.ts', 'compute.ts', 'figure.ts']) {
        expect(existsSync(join(root, 'server/physics/kinds', kind, file)), file).toBe(true)
      }
      expect(existsSync(join(root, 'tests/physics', `${kind}.test.ts`))).toBe(true)
      expect(existsSync(join(root, 'docs/calculations', `${kind}.md`))).toBe(true)
    })

    it('has a docs page that names every parameter, the formula, its source and the quality notes', () => {
      const page = pageOf(kind)
      const { properties } = parametersJsonSchema(definition) as { properties: Record<string, unknown> }
      for (const name of Object.keys(properties)) expect(page, name).toContain(`\`${name}\``)
      for (const heading of ['## Formula', '## Parameters', '## Worked example', '## Quality notes'])
        expect(page).toContain(heading)
      expect(page).toMatch(/\$\$/)
    })

    it('has a docs page whose notes are those that its code gives', () => {
      const told = notesOfPage(kind)
      expect(told.length).toBeGreaterThan(0)
      expect(new Set(told).size).toBe(told.length)
      for (const code of told) expect(source, code).toContain(`code: '${code}'`)
    })

    it('has a worked example with the numbers that it computes', async () => {
      const section = pageOf(kind).split('## Worked example')[1]!
      const example = JSON.parse(/```json\n([\s\S]*?)```/.exec(section)![1]!)
      const { result, codes } = await runKind(kind, example.parameters, readReferenceTags(example.record))
      const rows = [...section.matchAll(/^\| `(\/[^`]*)` \| ([^|]*) \| ([^|]*) \| ([^|]*) \| ([^|]*) \|$/gm)]
      const printed = (x: number | null) => (x === null ? 'none' : String(Number(x.toPrecision(7))))
      expect(rows.map((row) => row.slice(1, 6))).toEqual(
        figuresOf(kind, result).map((f) => [f.pointer, f.label, printed(f.value), printed(f.u), f.unit]),
      )
      const notes = /Notes of this example: (.*)\./.exec(section)![1]!
      expect(notes).toBe(codes.length === 0 ? 'none' : codes.map((code) => `\`${code}\``).join(', '))
      for (const code of codes) expect(notesOfPage(kind)).toContain(code)
    })

    it('loads, and its example fits its own schema', async () => {
      expect(Object.keys(await definition.load())).toContain('compute')
      expect(Object.keys(await definition.loadFigure())).toContain('figure')
      const parsed = parseParameters(definition, definition.example.parameters)
      // What is stored and signed is plain JSON, and parses to itself.
      expect(JSON.parse(JSON.stringify(parsed))).toEqual(parsed)
      expect(parseParameters(definition, parsed)).toEqual(parsed)
    })

    it('has a JSON Schema with a title for each parameter and refuses unknown ones', () => {
      const schema = parametersJsonSchema(definition) as {
        properties: Record<string, { title?: string }>
        additionalProperties: boolean
      }
      for (const [name, property] of Object.entries(schema.properties))
        expect(property.title, name).toBeTruthy()
      expect(schema.additionalProperties).toBe(false)
      const extra = { ...definition.example.parameters, nonsense: 1 }
      expect(() => parseParameters(definition, extra)).toThrow(/There is no parameter "nonsense"/)
    })
  },
)

describe('registry', () => {
  it('names what it knows when asked for something else', () => {
    expect(() => kindDefinition('tea')).toThrow(/Known are singles, coincidences, correlation/)
    expect(() => kindDefinition('singles', 99)).toThrow(/no version 99/)
    expect(kindDefinition('singles', 1)).toBe(kindDefinition('singles'))
  })

  it('fills in defaults, and takes picoseconds above 2^53 as text', () => {
    const definition = kindDefinition('coincidences')
    expect(parseParameters(definition, { a: 1, b: 2, windowPs: '2001' })).toEqual({
      a: 1,
      b: 2,
      windowPs: 2001,
      delayPs: 0,
      offPeakWindows: 0,
      darkRates: { a: { value: 0, u: 0, unit: 'cps' }, b: { value: 0, u: 0, unit: 'cps' } },
      subtract: 'product',
    })
    const far = (2n ** 60n).toString()
    expect(parseParameters(definition, { a: 1, b: 2, windowPs: 5, delayPs: far }).delayPs).toBe(far)
    const tooFar = { a: 1, b: 2, windowPs: 5, delayPs: (2n ** 61n + 1n).toString() }
    expect(() => parseParameters(definition, tooFar)).toThrow(/2\^61/)
    expect(() => parseParameters(definition, { a: 1, b: 2, windowPs: 0 })).toThrow(/at least 1 ps/)
  })
})
