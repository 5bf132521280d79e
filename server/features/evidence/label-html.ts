import { escapeHtml } from '../../document/index.ts'

const greek: Record<string, string> = {
  eta: 'η',
  tau: 'τ',
  chi: 'χ',
  beta: 'β',
  gamma: 'γ',
  sigma: 'σ',
  rho: 'ρ',
}

/** A figure's label with its symbol set as one: "g2(0), bin" as g⁽²⁾(0), "eta_A" as η with index A; words stay words. */
export function labelHtml(label: string): string {
  const [, name = '', mark = '', rest = ''] =
    /^([A-Za-z]+)(\d|_[A-Za-z0-9]+)?(?=[\s,(]|$)(.*)$/.exec(label) ?? []
  const letter = greek[name] ?? name
  const isSymbol = [...letter].length === 1 || (mark.startsWith('_') && letter.length <= 4)
  if (!isSymbol || (mark === '' && rest.startsWith(' '))) return escapeHtml(label)
  return `<i>${escapeHtml(letter)}</i>${markHtml(letter, mark)}${escapeHtml(rest)}`
}

function markHtml(letter: string, mark: string): string {
  if (mark === '') return ''
  if (letter === 'g' && mark === '2') return '<sup>(2)</sup>'
  if (letter === 'χ' && mark === '2') return '<sup>2</sup>'
  return `<sub>${escapeHtml(mark.replace('_', ''))}</sub>`
}
