const greek: Record<string, string> = {
  eta: 'η',
  tau: 'τ',
  chi: 'χ',
  beta: 'β',
  gamma: 'γ',
  sigma: 'σ',
  rho: 'ρ',
}

export interface LabelParts {
  /** In the notation of symbols, "g^(2)(0)"; null where the label is words alone. */
  symbol: string | null
  /** What follows the symbol, or the whole label. */
  words: string
}

/**
 * Splits the label of a reported figure into a physical symbol at its beginning and words: "g2(0), bin" is g⁽²⁾(0) and
 * ", bin". Labels are given by the calculation kinds; nothing here depends on which kind it is.
 */
export function labelParts(label: string): LabelParts {
  const [, first = '', rest = ''] = /^([^\s,]+)(.*)$/.exec(label) ?? []
  const symbol = symbolOf(first)
  return symbol === null ? { symbol, words: label } : { symbol, words: rest }
}

function symbolOf(token: string): string | null {
  const [, name = '', rest = ''] = /^([A-Za-z]+)(.*)$/.exec(token) ?? []
  if (name === '') return null
  const letter = greek[name] ?? name
  if (name === 'g' && /^2(?!\d)/.test(rest)) return `g^(2)${rest.slice(1)}`
  if (name === 'chi' && /^2(?!\d)/.test(rest)) return `χ^2${rest.slice(1)}`
  const isShort = [...letter].length === 1
  if (/^\d$/.test(rest) && isShort) return `${letter}_${rest}`
  const isAbbreviation = /^[A-Z]{1,4}$/.test(letter)
  if (/^(_[A-Za-z0-9]+)?$/.test(rest) && (isShort || isAbbreviation)) return letter + rest
  return null
}
