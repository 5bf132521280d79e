const greek: Record<string, string> = { eta: 'η', tau: 'τ', chi: 'χ', beta: 'β', gamma: 'γ', sigma: 'σ', rho: 'ρ' }

/**
 * The label of a reported figure in the notation of symbols ("g2(0)" becomes g^(2)(0)), or null where it is words.
 * Labels are given by the calculation kinds; nothing here depends on which kind it is.
 */
export function symbolOf(label: string): string | null {
  if (/\s/.test(label) || label.length > 14) return null
  const [, name = '', rest = ''] = /^([A-Za-z]+)(.*)$/.exec(label) ?? []
  if (name === '') return null
  const letter = greek[name] ?? name
  if (name === 'g' && /^2(?!\d)/.test(rest)) return `g^(2)${rest.slice(1).replace(/^_/, '_')}`
  if (/^\d$/.test(rest)) return `${letter}_${rest}`
  if (/^_?[A-Za-z0-9]{0,3}$/.test(rest) && (letter.length <= 1 || letter === letter.toUpperCase())) return letter + rest
  return greek[name] ? letter + rest : null
}
