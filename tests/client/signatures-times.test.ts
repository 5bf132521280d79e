import { describe, expect, test } from 'vitest'
import type { Run } from '../../server/contract/runs.ts'
import { presenceTrouble, spanOfRun } from '../../src/features/signatures/presence.ts'
import { deskSentence, daysSince } from '../../src/features/signatures/waiting.ts'
import { utcOfZoned, zonedOfUtc } from '../../src/lib/zoned-time.ts'

describe('times typed in the laboratory’s zone', () => {
  // Europe/Berlin is UTC+1 in winter and UTC+2 in summer; clocks change at 01:00 UTC (directive 2000/84/EC).
  test.each([
    ['2026-11-12 11:30', '2026-11-12T10:30:00.000Z'],
    ['2026-07-01 11:30:05', '2026-07-01T09:30:05.000Z'],
    ['2026-03-29 01:59', '2026-03-29T00:59:00.000Z'],
    ['2026-03-29 03:00', '2026-03-29T01:00:00.000Z'],
    ['2026-10-25 03:30', '2026-10-25T02:30:00.000Z'],
  ])('%s is %s', (text, utc) => {
    expect(utcOfZoned(text, 'Europe/Berlin')).toBe(utc)
    expect(zonedOfUtc(utc, 'Europe/Berlin').startsWith(text)).toBe(true)
  })

  test.each([
    '',
    'yesterday',
    '12.11.2026 11:30',
    '2026-13-01 10:00',
    '2026-02-30 10:00',
    '2026-11-12 24:10',
    '2026-11-12 10:61',
  ])('%j is no time', (text) => {
    expect(utcOfZoned(text, 'Europe/Berlin')).toBeNull()
  })
})

describe('presence at a run', () => {
  const run = {
    number: 'R-0612',
    startedAt: '2026-11-12T10:00:00.000Z',
    durationPs: '600000000000000',
  } as Run
  test.each([
    ['2026-11-12T09:00:00.000Z', '2026-11-12T10:00:00.000Z', null],
    ['2026-11-12T10:10:00.000Z', '2026-11-12T11:00:00.000Z', null],
    ['2026-11-12T09:00:00.000Z', '2026-11-12T09:59:59.999Z', /overlap/],
    ['2026-11-12T10:10:00.001Z', '2026-11-12T11:00:00.000Z', /overlap/],
    ['2026-11-12T10:05:00.000Z', '2026-11-12T10:04:00.000Z', /before/],
  ])('from %s to %s', (from, to, words) => {
    const trouble = presenceTrouble(run, from, to)
    if (words === null) expect(trouble).toBeNull()
    else expect(trouble).toMatch(words)
  })
})

describe('the desk in one sentence', () => {
  const now = new Date('2026-11-13T09:00:00.000Z')
  const days = (n: number) => new Date(now.getTime() - n * 86_400_000).toISOString()
  test('counts who waits, who is past seven days and who is past thirty', () => {
    expect(deskSentence([], now)).toBe('No sheet waits for you.')
    expect(deskSentence([days(0.2)], now)).toBe('One sheet waits for you, none past the seven-day limit.')
    expect(deskSentence([days(9), days(1), days(7), days(4)], now)).toBe(
      'Four sheets wait for you, one past the seven-day limit.',
    )
    expect(deskSentence([days(31), days(8)], now)).toBe(
      'Two sheets wait for you, two past the seven-day limit, one overdue.',
    )
  })
  test('a clock ahead of ours waits no negative time', () => {
    expect(daysSince(days(-1), now)).toBe(0)
  })
})

describe('times offered for presence', () => {
  test('hold the whole run, in whole seconds', () => {
    const run = {
      number: 'R-0009',
      startedAt: '2026-12-01T17:32:25.400Z',
      durationPs: '1999990000000',
    } as Run
    const { from, to } = spanOfRun(run)
    expect([from, to]).toEqual(['2026-12-01T17:32:25.000Z', '2026-12-01T17:32:28.000Z'])
    expect(presenceTrouble(run, from, to)).toBeNull()
  })
})
