import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { unzipSync } from 'fflate'
import { describe, expect, it } from 'vitest'
import { parseJson } from '../../server/ledger-format/canonical-json.ts'
import { recordBytes, type SignedRecord } from '../../server/ledger-format/index.ts'
import { askJudge, judgeIsThere } from './sample/judge.ts'
import { verifyBytes } from './sample/pack.ts'

/*
 * Bundles kept as they were made when the forms were settled: one by tests/ledger/sample, one exported by the product (a
 * notebook of the demonstration with a sealed sheet, its calculation and raw file). What is signed cannot change: if this
 * test fails, a release would refuse evidence that an earlier one gave out.
 */
const read = (name: string) => new Uint8Array(readFileSync(join(import.meta.dirname, 'golden', name)))
const golden = [
  { name: 'of the sample', bundle: read('bundle.zip'), anchors: read('anchors.json'), records: 5 },
  { name: 'of the product', bundle: read('product.zip'), anchors: read('product-anchors.json'), records: 2 },
]

describe.each(golden)('the golden bundle $name', ({ bundle, anchors, records: count }) => {
  it('still holds under its anchors', async () => {
    const report = await verifyBytes(bundle, { anchors: parseJson(anchors) })
    expect(report.checks.filter((check) => check.ok !== true)).toEqual([])
    expect(report).toMatchObject({ verdict: 'holds', anchors: 'matched' })
  })

  it('has records that this release would write byte for byte', () => {
    const records = Object.entries(unzipSync(bundle)).filter(([path]) => path.endsWith('/record.json'))
    expect(records.length).toBe(count)
    for (const [path, bytes] of records) {
      const again = recordBytes(parseJson(bytes) as unknown as SignedRecord)
      expect(Buffer.from(again).equals(bytes), path).toBe(true)
    }
  })

  it.runIf(judgeIsThere)('holds for the independent judge', () => {
    expect(askJudge(bundle, { '--anchors': anchors }).status).toBe(0)
  })
})
