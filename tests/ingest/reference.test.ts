import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { decodeColumns, encodeColumns } from '../../server/ingest/columns.ts'
import { referencePath } from '../support/reference.ts'
import { detect, readAsFound, tagsOf } from './support.ts'

// Source: exact answers beside the reference records, computed by another program.
interface Expected {
  tags: number
  firstPs: number
  lastPs: number
  durationPs: number
  counts: Record<string, number>
}
const expected = JSON.parse(readFileSync(referencePath('tags/expected.json'), 'utf8')) as Record<
  string,
  Expected
>

describe.each(Object.entries(expected))('reference record %s', (name, answer) => {
  const content = readFileSync(referencePath(`tags/${name}.csv`))

  it('is recognised without doubt', () => {
    expect(detect(content)).toMatchObject({
      format: 'delimited',
      version: 1,
      options: { time: 'timestamp_ps', channel: 'channel', unit: 'ps' },
      confident: true,
    })
  })

  it.each([content.length, 65_536, 4099])('has the expected counts, read in pieces of %i bytes', (piece) => {
    const { summary, times } = tagsOf(readAsFound(content, piece))
    expect(summary.tags).toBe(answer.tags)
    expect(times.length).toBe(answer.tags)
    expect(summary.firstPs).toBe(BigInt(answer.firstPs))
    expect(summary.lastPs).toBe(BigInt(answer.lastPs))
    expect(summary.durationPs).toBe(BigInt(answer.durationPs))
    expect(summary.outOfOrder).toBe(0)
    expect(Object.fromEntries(summary.channels.map((c) => [c.channel, c.counts]))).toEqual(answer.counts)
  })

  it('holds every row as it stands in the file, also after storing', () => {
    const reading = readAsFound(content)
    if (reading.kind !== 'tags') throw new Error('not tags')
    const { times, channels } = decodeColumns(encodeColumns(reading.record))
    const rows = content.toString('utf8').trim().split('\n').slice(1)
    expect(rows.findIndex((row, i) => row !== `${times[i]},${channels[i]}`)).toBe(-1)
    expect(times.length).toBe(rows.length)
  })
})
