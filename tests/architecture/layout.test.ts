import { readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { describe, expect, test } from 'vitest'

const root = resolve(import.meta.dirname, '../..')

function files(folder: string): string[] {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|css|mjs)$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name).slice(root.length + 1))
}

const sources = [...files('server'), ...files('src'), ...files('storage-fake')]

describe('layout', () => {
  test('no folder or file has a name that says nothing', () => {
    const empty = sources.filter((path) => /(^|\/)(utils?|misc|helpers?|common-utils)(\/|\.)/.test(path))
    expect(empty).toEqual([])
  })

  test('colours stand in tokens.css alone, so that no stray hue reaches the dark room', () => {
    const coloured = /#[0-9a-f]{3,8}\b(?!['"]?\))|\brgba?\(|\bhsla?\(/i
    const stray = sources
      .filter((path) => path.startsWith('src/') && !path.endsWith('tokens.css') && !path.includes('/checker/'))
      .filter((path) => coloured.test(readFileSync(join(root, path), 'utf8').replace(/url\(#[\w-]+\)|href="#[\w-]+"|'#[\w-]*'/g, '')))
    expect(stray).toEqual([])
  })

  test('every server feature is used through its index', () => {
    const features = readdirSync(join(root, 'server/features'), { withFileTypes: true }).filter((entry) => entry.isDirectory())
    for (const feature of features) expect(readdirSync(join(root, 'server/features', feature.name))).toContain('index.ts')
  })

  test('unfinished marks and switched-off tests do not land', () => {
    const marks = [...sources, ...files('tests')]
      .filter((path) => !path.startsWith('tests/architecture/'))
      .filter((path) => /\bTODO\b|\bFIXME\b|\b(it|test|describe)\.(skip|only|todo)\b/.test(readFileSync(join(root, path), 'utf8')))
    expect(marks).toEqual([])
  })
})
