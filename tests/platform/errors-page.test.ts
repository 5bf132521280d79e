import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { Problem, problemBody, problemTable, type ProblemCode } from '../../server/contract/problems.ts'

const page = readFileSync(new URL('../../docs/errors.md', import.meta.url), 'utf8')
const rows = [...page.matchAll(/^\| `([a-z-]+)` \| (\d{3}) \| ([^|]+) \| ([^|]+) \|$/gm)].map(
  ([, code, status, title, meaning]) => ({
    code,
    status: Number(status),
    title: title?.trim(),
    meaning: meaning?.trim() ?? '',
  }),
)

test('docs/errors.md has one row for each code, with its status and title', () => {
  const table = Object.entries(problemTable).map(([code, { status, title }]) => ({ code, status, title }))
  expect(rows.map(({ code, status, title }) => ({ code, status, title }))).toEqual(table)
})

test('each row says what to do', () => {
  for (const { code, meaning } of rows) expect(meaning.length, code).toBeGreaterThan(30)
})

test('a problem says its code as a stable URI, its status and title from the table, and its own members', () => {
  const problem = new Problem('wrong-passphrase', 'The passphrase is wrong.', { extra: { attemptsLeft: 4 } })
  expect(problemBody(problem)).toEqual({
    type: 'urn:halfsilver:problem:wrong-passphrase',
    code: 'wrong-passphrase',
    title: 'Wrong passphrase',
    status: 403,
    detail: 'The passphrase is wrong.',
    attemptsLeft: 4,
  })
})

test('only statuses that the contract names', () => {
  const named = [401, 403, 404, 409, 412, 413, 415, 416, 422, 423, 428, 429, 500, 503]
  for (const code of Object.keys(problemTable) as ProblemCode[])
    expect(named).toContain(problemTable[code].status)
})
