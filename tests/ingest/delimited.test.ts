import { describe, expect, it } from 'vitest'
import { detect, read, readAsFound, tagsOf } from './support.ts'

const rows: [string, string][] = [
  ['1096165', '1'],
  ['1676700', '1'],
  ['4319711', '2'],
  ['4319711', '0'],
]
const times = [1096165n, 1676700n, 4319711n, 4319711n]
const channels = [1, 1, 2, 0]

describe('delimiters and orders of columns', () => {
  const delimiters = { comma: ',', tab: '\t', semicolon: ';', spaces: '   ' }
  const cases = Object.entries(delimiters).flatMap(([name, text]) =>
    ['time first', 'channel first'].flatMap((order) =>
      ['\n', '\r\n'].map((end): [string, string, string, string] => [name, order, JSON.stringify(end), text]),
    ),
  )

  it.each(cases)('%s, %s, lines end in %s', (name, order, end, text) => {
    const swap = (pair: [string, string]) => (order === 'time first' ? pair : [pair[1], pair[0]])
    const lineEnd = JSON.parse(end) as string
    const content = [['time_ps', 'channel'] as [string, string], ...rows]
      .map((r) => swap(r).join(text))
      .join(lineEnd)
    for (const whole of [content, content + lineEnd, content + lineEnd + lineEnd]) {
      expect(detect(whole)).toMatchObject({
        options: { time: 'time_ps', channel: 'channel', unit: 'ps', delimiter: name },
        confident: true,
      })
      expect(tagsOf(readAsFound(whole))).toMatchObject({ times, channels })
    }
  })

  it.each([
    ['blanks around commas', 'time_ps , channel\n 1096165 , 1\n1676700\t,\t1 \n4319711,  2\n  4319711 ,0'],
    ['quotes', '"time_ps","channel"\n"1096165","1"\n1676700,1\n"4319711",2\n4319711,"0"\n'],
    ['plus signs', 'time_ps,channel\n+1096165,1\n+1676700,+1\n4319711,2\n4319711,0\n'],
    ['leading zeros', 'time_ps,channel\n0001096165,01\n0000000000001676700,1\n4319711,2\n4319711,0\n'],
    ['a byte order mark', '\uFEFFtime_ps,channel\n1096165,1\n1676700,1\n4319711,2\n4319711,0\n'],
    [
      'comments and blank lines',
      '# made in the test\n\n% more\ntime_ps,channel\n1096165,1\n\n# between\n1676700,1\n4319711,2\n  \n4319711,0\n',
    ],
    ['names in a comment', '# run 7\n# time_ps,channel\n1096165,1\n1676700,1\n4319711,2\n4319711,0\n'],
    [
      'more columns',
      'note,time_ps,energy,channel\na,1096165,1.5,1\nb c,1676700,,1\n"d,e",4319711,x,2\n,4319711,0,0\n',
    ],
    ['a delimiter at each end', 'time_ps,channel,\n1096165,1,\n1676700,1,\n4319711,2,\n4319711,0,\n'],
    ['a unit apart, between spaces', 'time (ps)  channel\n1096165 1\n1676700 1\n4319711 2\n4319711 0\n'],
    [
      'whole numbers with a point',
      'time_ps,channel\n1096165.0,1.0\n1676700.,1\n4.319711e6,2\n431971100e-2,0\n',
    ],
  ])('%s', (_, content) => {
    expect(detect(content)).toMatchObject({ confident: true })
    for (const piece of [1, 7, 65_536])
      expect(tagsOf(readAsFound(content, piece))).toMatchObject({ times, channels })
  })
})

describe('names and units of columns', () => {
  it.each([
    ['timestamp_ps', 'ps'],
    ['Time (ns)', 'ns'],
    ['t [µs]', 'us'],
    ['t (us)', 'us'],
    ['time/ns', 'ns'],
    ['arrival time ns', 'ns'],
    ['TimeTag (ps)', 'ps'],
    ['t_ns', 'ns'],
  ])('%s is a time in %s', (name, unit) => {
    for (const channel of ['channel', 'Ch.', 'detector', 'CHAN']) {
      expect(detect(`${name},${channel}\n1,2\n3,4\n`)).toMatchObject({
        options: { time: name, channel, unit },
        confident: true,
      })
    }
  })

  it('ms and s are read as ticks of that length', () => {
    expect(tagsOf(readAsFound('time_s,channel\n0.000000000001,1\n1.5,2\n')).times).toEqual([
      1n,
      1_500_000_000_000n,
    ])
    expect(tagsOf(readAsFound('time_ms,channel\n0.25,1\n1,2\n')).times).toEqual([
      250_000_000n,
      1_000_000_000n,
    ])
  })

  it('µ in Latin-1 is understood', () => {
    const content = Buffer.from('t (µs),channel\n1,2\n3,4\n', 'latin1')
    expect(detect(content).options).toMatchObject({ unit: 'us' })
  })

  it('ticks need their length, from a comment or a person', () => {
    expect(() => detect('ticks,channel\n1,2\n3,4\n')).toThrow('does not say how long a tick is')
    const content = '# tick (ps) = 12.5\nticks,channel\n1,2\n3,4\n'
    expect(detect(content)).toMatchObject({ options: { unit: 'ticks', tickPs: '12.5' }, confident: true })
    // floor(12.5 + 1/2) = 13, floor(37.5 + 1/2) = 38
    expect(tagsOf(readAsFound(content)).times).toEqual([13n, 38n])
    expect(detect('# resolution: 0.081 ns\ntime (ticks),channel\n1,2\n').options).toMatchObject({
      tickPs: '81',
    })
  })

  it('a unit that nothing states is a guess', () => {
    expect(detect('time,channel\n1000,1\n2000,2\n')).toMatchObject({
      options: { unit: 'ps' },
      confident: false,
    })
    expect(detect('time,channel\n1.5,1\n2.25,2\n')).toMatchObject({
      options: { unit: 'ns' },
      confident: false,
    })
  })

  it('what was guessed is told', () => {
    expect(detect('time_ps,channel\n1000,1\n2000,2\n').doubt).toBe(null)
    expect(detect('time,channel\n1000,1\n2000,2\n').doubt).toBe(
      'The file does not say the unit of the times: ps was assumed. Check the reading.',
    )
  })

  it('two times, or two channels, are a guess', () => {
    expect(detect('time_ps,time_ns,channel\n1000,1,1\n2000,2,2\n')).toMatchObject({
      options: { time: 'time_ps' },
      confident: false,
    })
  })
})

describe('without names', () => {
  const lines = ['1096165,1', '1676700,1', '4319711,2', '4500000,0']

  it('columns are told by their values, with doubt', () => {
    expect(detect(lines.join('\n'))).toMatchObject({
      options: { time: 'col1', channel: 'col2', unit: 'ps', header: false },
      confident: false,
    })
    const swapped = lines.map((line) => line.split(',').reverse().join(' ')).join('\n')
    expect(detect(swapped)).toMatchObject({
      options: { time: 'col2', channel: 'col1', delimiter: 'spaces' },
      confident: false,
    })
    expect(tagsOf(readAsFound(swapped)).channels).toEqual([1, 1, 2, 0])
  })

  it('a regular grid is a table, not tags', () => {
    expect(readAsFound('0,12\n500000,14\n1000000,9\n1500000,11\n')).toMatchObject({
      kind: 'table',
      columns: ['col1', 'col2'],
    })
    expect(readAsFound('0;3\n10;4\n25;9\n45;11\n')).toMatchObject({ kind: 'table' })
  })

  it('col1, col2 are the names to choose by', () => {
    const options = { time: 'col2', channel: 'col1', unit: 'ps' }
    expect(tagsOf(read('3 10\n4 5\n', options))).toMatchObject({ times: [5n, 10n], channels: [4, 3] })
  })
})

describe('exact times', () => {
  // Rule: t = floor(y + 1/2) with y the decimal times the unit, exact (definitions.md, B0 and B1).
  it.each([
    ['12.345', 'ns', 12345n],
    ['12.3454', 'ns', 12345n],
    ['12.3455', 'ns', 12346n],
    ['12.34549999999999999999999999', 'ns', 12345n],
    ['-12.3455', 'ns', -12345n],
    ['-12.34550000000000000000000001', 'ns', -12346n],
    ['-0.5', 'ps', 0n],
    ['-0.50000001', 'ps', -1n],
    ['0.5', 'ps', 1n],
    ['.5', 'ps', 1n],
    ['0.49999999999999999999', 'ps', 0n],
    ['0.001', 'us', 1000n],
    ['1.0000005', 'us', 1000001n],
    ['1.00000049', 'us', 1000000n],
    // 1.005 in a double is 1.00499999999999989...
    ['1.0005', 'ns', 1001n],
    ['4503599627370.4965', 'ns', 4503599627370497n],
    ['9007199254740993', 'ps', 9007199254740993n],
    ['9007199254740.993', 'ns', 9007199254740993n],
    ['1234567890123456789', 'ps', 1234567890123456789n],
    ['-1234567890123456789', 'ps', -1234567890123456789n],
    ['2305843009213693952', 'ps', 2n ** 61n],
    ['-2305843009213693952', 'ps', -(2n ** 61n)],
    ['2305843009213693952.49', 'ps', 2n ** 61n],
    ['4294967296', 'ps', 2n ** 32n],
    ['-4294967296', 'ps', -(2n ** 32n)],
    ['-4294967297', 'ps', -(2n ** 32n) - 1n],
    ['1e3', 'ns', 1000000n],
    ['1.5E-3', 'ns', 2n],
    ['1e-400', 'ns', 0n],
  ])('%s %s is %s ps', (text, unit, expected) => {
    const options = { time: 'time', channel: 'channel', unit }
    expect(tagsOf(read(`time,channel\n${text},1\n`, options)).times).toEqual([expected])
  })

  it.each([
    '2305843009213693953',
    '-2305843009213693953',
    '2305843009213693952.5',
    '1e19',
    '99999999999999999999',
  ])('%s ps is refused: beyond 2^61', (text) => {
    const options = { time: 'time', channel: 'channel', unit: 'ps' }
    expect(() => read(`time,channel\n1,1\n${text},1\n`, options)).toThrow(
      /Line 3 cannot be read.*within 2\^61 ps.*The first row is readable/,
    )
  })

  it.each([
    ['12.5', '3', 38n],
    ['12.5', '1', 13n],
    ['81', '12345678901234', 81n * 12345678901234n],
    ['0.0001', '4999', 0n],
    ['0.0001', '5000', 1n],
    ['1000', '1.2345', 1235n],
    ['82.3045', '1000000000000', 82304500000000n],
  ])('ticks of %s ps: %s ticks are %s ps', (tickPs, ticks, expected) => {
    const options = { time: 'n', channel: 'c', unit: 'ticks', tickPs }
    expect(tagsOf(read(`n;c\n${ticks};1\n`, options)).times).toEqual([expected])
  })

  it('a decimal comma is read beside semicolons and tabs only', () => {
    const options = { time: 't', channel: 'c', unit: 'ns' }
    expect(tagsOf(read('t;c\n12,345;1\n', options)).times).toEqual([12345n])
    expect(tagsOf(read('t\tc\n12,3455\t1\n', options)).times).toEqual([12346n])
    expect(() => read('t;c\n1,234,567;1\n', options)).toThrow('Line 2')
    expect(() => read('t,c\n1,345,1\n', options)).toThrow('Line 2')
    expect(() => read('t c\n1,345 1\n', options)).toThrow('Line 2')
  })
})

describe('order of the tags', () => {
  it('is put right stably, and told', () => {
    const content = 'time_ps,channel\n50,1\n10,2\n50,3\n10,4\n50,5\n-7,6\n'
    const { times: sorted, channels: by, summary } = tagsOf(readAsFound(content))
    expect(sorted).toEqual([-7n, 10n, 10n, 50n, 50n, 50n])
    expect(by).toEqual([6, 2, 4, 1, 3, 5])
    expect(summary).toMatchObject({
      outOfOrder: 3,
      largestStepBackPs: 57n,
      firstPs: -7n,
      lastPs: 50n,
      durationPs: 57n,
    })
  })

  it('steps back by more than 2^53 ps are exact', () => {
    const { summary } = tagsOf(readAsFound(`time_ps,channel\n${2n ** 61n},1\n${-(2n ** 61n)},2\n`))
    expect(summary.largestStepBackPs).toBe(2n ** 62n)
    expect(summary.resolutionPs).toBe(2n ** 62n)
  })
})

describe('summary', () => {
  it('has the common divisor of the steps, whatever the offset', () => {
    const resolutionOf = (list: bigint[]) =>
      tagsOf(readAsFound(`time_ps,channel\n${list.map((t) => `${t},1\n`).join('')}`)).summary.resolutionPs
    expect(resolutionOf([3n, 15n, 15n, 51n])).toBe(12n)
    expect(resolutionOf([7n])).toBe(0n)
    expect(resolutionOf([7n, 7n])).toBe(0n)
    expect(resolutionOf([0n, 6n, 6n + 9n * 2n ** 55n])).toBe(6n)
  })

  it('takes the duration that a comment declares', () => {
    const body = 'time_ps,channel\n10,1\n20,1\n'
    const durationOf = (comment: string) => tagsOf(readAsFound(`${comment}\n${body}`)).declaredDurationPs
    expect(durationOf('# duration_ps = 100')).toBe(100n)
    expect(durationOf('% Acquisition time: 0.5 s')).toBe(500_000_000_000n)
    expect(durationOf('# duration (ms): 2')).toBe(2_000_000_000n)
    expect(durationOf('# duration = 100')).toBe(null)
    expect(durationOf('# duration of the walk was long')).toBe(null)
    expect(tagsOf(readAsFound(`# duration_ps = 100\n${body}`)).summary.durationPs).toBe(100n)
  })

  it('lists the channels that have tags', () => {
    const { summary } = tagsOf(readAsFound('time_ps,channel\n1,65535\n2,0\n3,0\n'))
    expect(summary.channels).toEqual([
      { channel: 0, counts: 2 },
      { channel: 65_535, counts: 1 },
    ])
  })
})

describe('tables and histograms', () => {
  it('keep named columns of numbers; text columns are left out', () => {
    const reading = readAsFound(
      'angle_deg;date;counts;power_mW\n0;2026-03-02;120;1,5\n45;2026-03-03;64;1,25\n',
    )
    expect(reading).toEqual({
      kind: 'table',
      columns: ['angle_deg', 'counts', 'power_mW'],
      rows: 2,
      values: [Float64Array.of(0, 45), Float64Array.of(120, 64), Float64Array.of(1.5, 1.25)],
      integer: [true, true, false],
    })
  })

  it.each(['delay_ps,counts', 'tau (ns),coincidences', 'Delay,g2,u'])('%s is a histogram', (header) => {
    const row = header
      .split(',')
      .map((_, i) => String(i + 1))
      .join(',')
    expect(readAsFound(`${header}\n${row}\n${row}\n`)).toMatchObject({ kind: 'histogram', rows: 2 })
  })

  it('a trace of counts with a channel is a table', () => {
    expect(readAsFound('time_s,channel,counts\n0,1,20\n1,1,22\n')).toMatchObject({ kind: 'table' })
  })

  it('refuse a cell that is no number, and two columns of one name', () => {
    expect(() => readAsFound('x,counts\n1,2\n2,\n3,4\n')).toThrow(
      /Line 3 cannot be read: found “2,”.*numbers in x, counts/,
    )
    expect(() => readAsFound('x,counts\n1,2\n2,1e999\n')).toThrow('Line 3')
    expect(() => readAsFound('x,x\n1,2\n')).toThrow('Two columns are named x')
  })
})

describe('other files', () => {
  it.each([
    ['prose', 'Aligned the cube today, 3 mirrors.\nNothing else worked, sadly.\n'],
    ['an empty comment file', '# nothing\n'],
    ['nested text', '{\n "a": 1,\n "b": [2, 3]\n}\n'],
    ['a picture', new Uint8Array([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13])],
    ['UTF-16', new Uint8Array(Buffer.from('\uFEFFtime,channel\n1,2\n', 'utf16le'))],
  ])('%s is kept as it is', (_, content) => {
    const reading = readAsFound(content)
    expect(reading.kind).toBe('other')
    if (reading.kind === 'other') expect(reading.detail).toMatch(/It is kept as it is\.$/)
  })
})
