import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { detectReading, createParser } from '../../server/ingest/registry.ts'
import { UnreadableFile } from '../../server/ingest/unreadable-file.ts'
import { read, tagsOf } from './support.ts'

/** Recognises and reads; every refusal must be a sentence, never a crash. */
function survives(content: Uint8Array, piece: number): void {
  const found = detectReading(content.subarray(0, 65_536), 'file')
  if ('unreadable' in found) return
  const options = { time: 'col1', channel: 'col2', unit: 'ns' }
  for (const ways of [found.options, ...(found.format === 'delimited' ? [options, {}] : [])]) {
    try {
      const parser = createParser(found.format, found.version, ways)
      for (let at = 0; at < content.length; at += piece) parser.push(content.subarray(at, at + piece))
      parser.finish()
    } catch (error) {
      if (!(error instanceof UnreadableFile)) throw error
      expect(error.message.length).toBeGreaterThan(10)
    }
  }
}

const texts = fc
  .array(fc.constantFrom(...'0123456789,;\t .+-eE#%"\r\n', 'time_ps', 'channel', 'µ', 'x'), {
    maxLength: 200,
  })
  .map((parts) => new Uint8Array(Buffer.from(parts.join(''))))

describe('any bytes', () => {
  it('are read or refused with a sentence', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 300 }), fc.integer({ min: 1, max: 40 }), survives), {
      numRuns: 500,
    })
    fc.assert(fc.property(texts, fc.integer({ min: 1, max: 40 }), survives), { numRuns: 1500 })
  })

  it('a record with one byte changed or cut off is read or refused with a sentence', () => {
    const record = Buffer.from(
      'time_ps,channel\n' + Array.from({ length: 30 }, (_, i) => `${i * 997},${i % 3}\n`).join(''),
    )
    const damage = fc.tuple(fc.nat(record.length - 1), fc.nat(255), fc.nat(record.length))
    fc.assert(
      fc.property(damage, ([at, byte, length]) => {
        const damaged = new Uint8Array(record)
        damaged[at] = byte
        survives(damaged.subarray(0, length), 64)
      }),
      { numRuns: 1500 },
    )
  })
})

const time = fc.oneof(
  fc.bigInt(-(2n ** 61n), 2n ** 61n),
  fc.bigInt(-100n, 100n),
  fc.bigInt(2n ** 53n - 5n, 2n ** 53n + 5n),
)
const tag = fc.tuple(time, fc.oneof(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 0, max: 65_535 })))

describe('any tags', () => {
  it('come back sorted stably, whatever the delimiter and the pieces', () => {
    const delimiter = fc.constantFrom(',', ';', '\t', ' ')
    fc.assert(
      fc.property(
        fc.array(tag, { minLength: 1, maxLength: 60 }),
        delimiter,
        fc.integer({ min: 1, max: 64 }),
        (tags, d, piece) => {
          const content = `time_ps${d}channel\n${tags.map(([t, c]) => `${t}${d}${c}\n`).join('')}`
          const { times, channels, summary } = tagsOf(
            read(content, { time: 'time_ps', channel: 'channel', unit: 'ps' }, piece),
          )
          // Array.prototype.sort is stable by the language standard.
          const sorted = [...tags].sort((a, b) => (a[0] < b[0] ? -1 : a[0] > b[0] ? 1 : 0))
          expect(times).toEqual(sorted.map(([t]) => t))
          expect(channels).toEqual(sorted.map(([, c]) => c))
          expect(summary.outOfOrder).toBe(tags.filter(([t], i) => i > 0 && t < tags[i - 1]![0]).length)
          for (const t of times)
            if (summary.resolutionPs > 0n) expect((t - times[0]!) % summary.resolutionPs).toBe(0n)
        },
      ),
      { numRuns: 300 },
    )
  })

  it('round as exact rational arithmetic does', () => {
    const unit = fc.constantFrom<[string, bigint]>(['ps', 1n], ['ns', 1000n], ['us', 1_000_000n])
    const decimal = fc.tuple(
      fc.boolean(),
      fc.bigInt(0n, 10n ** 11n),
      fc.integer({ min: 0, max: 9 }),
      fc.nat(999_999_999),
    )
    fc.assert(
      fc.property(unit, decimal, ([name, factor], [negative, whole, places, part]) => {
        const fraction = String(part).padStart(9, '0').slice(0, places)
        const text = `${negative ? '-' : ''}${whole}${places > 0 ? `.${fraction}` : ''}`
        const numerator = BigInt(`${whole}${fraction}`) * factor * (negative ? -1n : 1n)
        const double = 2n * 10n ** BigInt(places)
        // floor(n/d + 1/2) = floor((2n + d)/(2d)), with a floor towards minus infinity.
        const above = 2n * numerator + double / 2n
        const expected = (above - (((above % double) + double) % double)) / double
        const options = { time: 't', channel: 'c', unit: name }
        expect(tagsOf(read(`t,c\n${text},1\n`, options)).times).toEqual([expected])
      }),
      { numRuns: 1000 },
    )
  })
})
