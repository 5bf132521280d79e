import { createRequire } from 'node:module'
import { resolve } from 'node:path'
import { cruise, type IReporterOutput, type ICruiseResult } from 'dependency-cruiser'
import { describe, expect, test } from 'vitest'

const root = resolve(import.meta.dirname, '../..')
const ruleSet = createRequire(import.meta.url)(resolve(root, '.dependency-cruiser.cjs'))

async function violations(baseDir: string, folders: string[]): Promise<string[]> {
  const answer: IReporterOutput = await cruise(folders, { ...ruleSet.options, ruleSet, validate: true, baseDir, tsConfig: undefined })
  const { summary } = answer.output as ICruiseResult
  return summary.violations.map((violation) => `${violation.rule.name}: ${violation.from}`).sort()
}

describe('arrows', () => {
  test('the product keeps every arrow', async () => {
    expect(await violations(root, ['server', 'src', 'storage-fake'])).toEqual([])
  }, 120_000)

  test('a broken tree is found out, rule by rule', async () => {
    const found = await violations(resolve(import.meta.dirname, 'broken'), ['server', 'src'])
    expect(found).toContain('contract-is-alone: server/contract/reaches-out.ts')
    expect(found).toContain('pure-parts: server/physics/impure.ts')
    expect(found).toContain('client-downwards: src/ui/knows-domain.ts')
    expect(found.some((violation) => violation.startsWith('no-ring'))).toBe(true)
  })
})
