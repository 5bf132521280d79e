import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { unzipSync } from 'fflate'
import { describe, expect, it } from 'vitest'
import { parseJson } from '../../server/ledger-format/canonical-json.ts'
import { recordBytes, type SignedRecord } from '../../server/ledger-format/index.ts'
import { askJudge, judgeIsThere } from './sample/judge.ts'
import { verifyBytes } from './sample/pack.ts'

/*
 * A bundle kept as it was made on the day when the forms were settled (by tests/ledger/sample). What is signed cannot change: if this
 * test fails, a release would refuse evidence that an earlier one gave out.
 */
const read = (name: string) => new Uint8Array(readFileSync(join(import.meta.dirname, 'golden', name)))
const bundle = read('bundle.zip')
const anchors = read('anchors.json')

describe('the golden bundle', () => {
  it('still holds under its anchors', async () => {
    const report = await verifyBytes(bundle, { anchors: parseJson(anchors) })
    expect(report.checks.filter((check) => check.ok !== true)).toEqual([])
    expect(report).toMatchObject({ verdict: 'holds', anchors: 'matched' })
  })

  it('has records that this release would write byte for byte', () => {
    const records = Object.entries(unzipSync(bundle)).filter(([path]) => path.endsWith('/record.json'))
    expect(records.length).toBe(5)
    for (const [path, bytes] of records) {
      const again = recordBytes(parseJson(bytes) as unknown as SignedRecord)
      expect(Buffer.from(again).equals(bytes), path).toBe(true)
    }
  })

  it.runIf(judgeIsThere)('holds for the independent judge', () => {
    expect(askJudge(bundle, { '--anchors': anchors }).status).toBe(0)
  })
})
