import { parseDecimal, roundedProduct, type Decimal } from '../../decimal.ts'

const unitPs: Record<string, Decimal> = {
  ps: { digits: 1n, scale: 0 },
  ns: { digits: 1n, scale: -3 },
  us: { digits: 1n, scale: -6 },
  ms: { digits: 1n, scale: -9 },
  s: { digits: 1n, scale: -12 },
}

const unit = '(ps|ns|us|µs|μs|ms|s)'
const value = '([+]?[0-9.]+(?:[eE][+-]?[0-9]+)?)'

/** `# duration_s = 10`, `% acquisition time: 0.5 s`, `# tick (ps) = 12.5` */
function commentForm(names: string): RegExp {
  return new RegExp(
    `^[ \\t]*[#%]+\\s*(?:${names})\\s*(?:[_ ]*[([]?${unit}[)\\]]?)?\\s*[:=]\\s*${value}\\s*${unit}?\\s*$`,
    'i',
  )
}

const durationForm = commentForm('duration|(?:acquisition|measurement|integration)[ _]time')
const tickForm = commentForm('tick|tick[ _]length|time[ _]bin|resolution')

/** Value and unit that the first comment of a form states; null when none does, or not with a unit once. */
function stated(comments: string[], form: RegExp): { value: Decimal; unit: Decimal } | null {
  for (const comment of comments) {
    const [, before, number = '', after] = form.exec(comment) ?? []
    const name = (before ?? after)?.toLowerCase().replace(/^[µμ]/, 'u')
    const decimal = parseDecimal(number)
    if (decimal && name !== undefined && (before === undefined || after === undefined)) {
      return { value: decimal, unit: unitPs[name]! }
    }
  }
  return null
}

/** The acquisition time that a comment above the rows declares, in ps; null when none does. */
export function declaredDuration(comments: string[]): bigint | null {
  const found = stated(comments, durationForm)
  const duration = found && roundedProduct(found.value, found.unit)
  return duration !== null && duration > 0n && duration <= 2n ** 61n ? duration : null
}

/** The length of a tick that a comment above the rows declares, in ps as an exact decimal; null when none does. */
export function declaredTick(comments: string[]): string | null {
  const found = stated(comments, tickForm)
  if (!found || found.value.digits <= 0n) return null
  const scale = found.value.scale + found.unit.scale
  if (scale <= 0) return String(found.value.digits * 10n ** BigInt(-scale))
  const digits = String(found.value.digits).padStart(scale + 1, '0')
  return `${digits.slice(0, -scale)}.${digits.slice(-scale)}`
}
