import { describe, expect, it } from 'vitest'
import { Problem } from '../../server/contract/problems.ts'
import { createParser, detectReading, formatVersion, readingOptions } from '../../server/ingest/registry.ts'
import { UnreadableFile } from '../../server/ingest/unreadable-file.ts'
import { bytes, read, readAsFound } from './support.ts'

const options = { time: 'time_ps', channel: 'channel', unit: 'ps' }

function refusal(content: string, piece?: number): UnreadableFile {
  try {
    read(content, options, piece)
  } catch (error) {
    if (error instanceof UnreadableFile) return error
    throw error
  }
  throw new Error('The file was read.')
}

describe('a row that does not fit', () => {
  const good = Array.from({ length: 12_345 }, (_, i) => `${1000 * i},${i % 4}\n`).join('')

  it('is named by line, with what was found, what was expected and what is usable', () => {
    for (const piece of [13, 65_536]) {
      const error = refusal(`time_ps,channel\n${good}oops,1\n5,5\n`, piece)
      expect(error.line).toBe(12_347)
      expect(error.message).toBe(
        'Line 12\u2009347 cannot be read: found “oops,1”, expected 2 columns separated by commas, with a time in ps and a channel number. ' +
          'The first 12\u2009345 rows are readable.',
      )
    }
  })

  it.each([
    '1',
    '1,',
    ',1',
    '1,2,3',
    '1;2',
    '1,-2',
    '1,1.5',
    '1,a',
    'x,1',
    '0x10,1',
    'NaN,1',
    'Infinity,1',
    '1e,1',
    '1.2.3,1',
    '--1,1',
    '1 2,1',
    '1,1 1',
    '1,65536',
    '1,999999999999',
    '"1,1',
    '1e999,1',
  ])('%s', (row) => {
    const error = refusal(`time_ps,channel\n7,1\n${row}\n`)
    expect(error.line).toBe(3)
    expect(error.usable).toBe('The first row is readable.')
  })

  it('counts comments and blank lines as lines, not as rows', () => {
    const error = refusal('# a\n\ntime_ps,channel\n\n1,1\n# b\nbad\n')
    expect(error.line).toBe(7)
    expect(error.usable).toBe('The first row is readable.')
  })

  it('shows no control characters and no end of a long line', () => {
    const error = refusal(`time_ps,channel\n\u0001${'z'.repeat(500)}\n`.replace('\u0001', '\u0085'))
    expect(error.message).not.toMatch(/\p{Cc}/u)
    expect(error.message.length).toBeLessThan(300)
  })
})

describe('a file cut in its last row', () => {
  it.each(['12', '123,', '-'])('…%s', (rest) => {
    const error = refusal(`time_ps,channel\n1,1\n2,2\n${rest}`)
    expect(error.line).toBe(4)
    expect(error.message).toContain('The file ends in the middle of its last row')
    expect(error.usable).toBe('The first 2 rows are readable.')
  })
})

describe('files without tags', () => {
  it.each([
    ['', 'The file is empty.'],
    ['time_ps,channel\n', 'The file holds no tags'],
    ['# only\n% comments\n\n', 'The file holds no rows'],
    ['   \n\n', 'The file holds no rows'],
  ])('%j is refused', (content, sentence) => {
    expect(refusal(content).message).toContain(sentence)
  })

  it('an empty file is refused at recognition', () => {
    expect(detectReading(new Uint8Array(0), 'run.csv')).toEqual({ unreadable: 'run.csv is empty.' })
    expect(() => createParser('other', 1, {}).finish()).toThrow(UnreadableFile)
  })

  it('binary and endless lines are not delimited text', () => {
    expect(refusal('time_ps,channel\n\u00001,1\n').message).toContain('control bytes')
    expect(refusal(`time_ps,channel\n${'1'.repeat(70_000)},1\n`).message).toContain('longer than')
  })

  it('a column that is not there is named with those that are', () => {
    expect(() => read('a,b\n1,2\n', options)).toThrow(
      'There is no column time_ps in the file; its columns are a, b.',
    )
  })
})

describe('options', () => {
  const refused = (given: Record<string, unknown>) => {
    try {
      readingOptions('delimited', given)
    } catch (error) {
      if (error instanceof Problem) return error.message
      throw error
    }
    return null
  }

  it.each([
    [{ time: 'a', channel: 'b' }, 'given together'],
    [{ time: 'a', channel: 'a', unit: 'ps' }, 'two columns'],
    [{ time: 'a', channel: 'b', unit: 's' }, 'Invalid'],
    [{ time: 'a', channel: 'b', unit: 'ticks' }, 'need tickPs'],
    [{ time: 'a', channel: 'b', unit: 'ps', tickPs: '1' }, 'goes with the unit ticks'],
    [{ time: 'a', channel: 'b', unit: 'ticks', tickPs: '0.0' }, 'positive decimal'],
    [{ time: 'a', channel: 'b', unit: 'ticks', tickPs: '-1' }, 'positive decimal'],
    [{ time: 'a', channel: 'b', unit: 'ticks', tickPs: '1e3' }, 'positive decimal'],
    [{ time: 'a', channel: 'b', unit: 'ticks', tickPs: '9'.repeat(90) }, 'positive decimal'],
    [{ delimiter: '|' }, 'Invalid'],
    [{ colour: 'red' }, 'colour'],
  ])('%j: refused, %s', (given, why) => {
    expect(refused(given)).toContain(why)
  })

  it('are kept as given; a tick may be a number', () => {
    const given = { time: 'a', channel: 'b', unit: 'ticks', tickPs: '12.50', delimiter: 'tab', header: false }
    expect(readingOptions('delimited', given)).toEqual(given)
    expect(readingOptions('delimited', { time: 'a', channel: 'b', unit: 'ticks', tickPs: 81 })).toMatchObject(
      { tickPs: '81' },
    )
  })

  it('of an unknown format or version are refused', () => {
    expect(() => formatVersion('sounds')).toThrow(
      'There is no format sounds; the formats are delimited, other.',
    )
    expect(() => createParser('delimited', 2, {})).toThrow('Version 2')
  })
})

it('a Latin-1 note in a column that is not read does no harm', () => {
  const content = Buffer.concat([
    bytes('time_ps,channel,note\n1,2,'),
    Buffer.from([0xb5, 0x0a]),
    bytes('3,4,x\n'),
  ])
  expect(readAsFound(new Uint8Array(content))).toMatchObject({ kind: 'tags' })
})
