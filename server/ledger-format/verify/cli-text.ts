import type { VerifyReport } from './index.ts'

const marks = new Map<boolean | null, string>([
  [true, 'note'],
  [false, 'FAILS'],
  [null, 'missing'],
])

/**
 * The report for people: whose keys these are comes first, then who stamped, then what fails or is missing by check and path,
 * then the verdict.
 */
export function reportText(report: VerifyReport): string {
  const shown = report.checks.filter((check) => check.ok !== true || check.detail !== '')
  const order = (ok: boolean | null) => (ok === false ? 0 : ok === null ? 1 : 2)
  const lines = [...shown]
    .sort((a, b) => order(a.ok) - order(b.ok))
    .map((check) => `${marks.get(check.ok)}: ${check.name}: ${check.path}: ${check.detail}`)
  return (
    [
      ...anchorsLines(report),
      ...(report.about.timeStampAuthority === null ? [] : [report.about.timeStampAuthority]),
      ...lines,
      ...verdictLines(report),
    ]
      .map(printable)
      .join('\n') + '\n'
  )
}

function anchorsLines({ anchors, about: { digests } }: VerifyReport): string[] {
  if (anchors === 'matched')
    return ['Anchors: matched. These are the keys of the laboratory whose anchors you gave.']
  if (anchors === 'different')
    return [
      'Anchors: DIFFERENT. This bundle was not made with the keys of the laboratory whose anchors you gave.',
    ]
  const head =
    'Anchors: not given. A bundle can only be consistent with itself; whose keys these are was not checked: compare these digests'
  if (!digests) return [`${head}, which could not be read.`]
  return [
    `${head} with the anchors that the laboratory gave you apart from the bundle.`,
    ...Object.entries(digests).flatMap(([name, value]) => [value].flat().map((item) => `  ${name}: ${item}`)),
  ]
}

function verdictLines({ verdict, checks, anchors, about }: VerifyReport): string[] {
  const count = (ok: boolean | null) => checks.filter((check) => check.ok === ok).length
  const meaning = {
    holds: 'everything holds',
    broken: 'something is false: see the lines that begin with FAILS',
    incomplete: 'nothing is false, but something is missing',
  }[verdict]
  const entries =
    about.entries.length > 0 ? `Entries: ${about.entries.join(', ')}.` : 'No entries could be read.'
  return [
    entries,
    `${verdict}: ${meaning}. ${checks.length} checks, ${count(false)} fail, ${count(null)} missing, anchors ${anchors}.`,
  ]
}

/** Names come from the bundle: nothing in them may steer a terminal. */
function printable(line: string): string {
  return line.replace(
    /[^\P{C}]/gu,
    (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`,
  )
}
