import { escapeHtml as text } from '../../document/index.ts'
import { fringeUrl } from './fringe-mark.ts'
import type { SheetInput } from './sheet-input.ts'
import { zonedTime } from './words.ts'

/** Drawings of the four stations (look.md, seal line): signature, arrow, half glass, full glass. */
const drawings = {
  signature: '<path d="M1.5 1.5H21.5V21.5H1.5Z"/><path d="M5 15C8 6 10 6 10 12S13 17 18 8"/>',
  arrow: '<path d="M1.5 1.5H21.5V21.5H1.5Z"/><path d="M5 11.5H17M12.5 7L17 11.5L12.5 16"/>',
  half: '<path d="M1.5 1.5H21.5V21.5H1.5Z"/><path d="M1.5 1.5H21.5L1.5 21.5Z" fill="#ccc"/>',
  full: '<path d="M1.5 1.5H21.5V21.5H1.5Z" fill="#000"/><path d="M3 20L20 3" stroke="#fff"/>',
}

/** The way of a sealed sheet in four stations, each with who and when. */
export function sealLine({ signatures, seal, zone, bodySha256 }: SheetInput): string {
  const living = signatures.filter(({ voided }) => !voided)
  const authors = living.filter(({ meaning }) => meaning === 'authorship')
  const witnesses = living.filter(({ meaning }) => meaning !== 'authorship')
  const lastTime = (of: typeof living) => of.at(-1)?.time ?? seal.time
  const names = (of: typeof living) => of.map(({ signer }) => signer.name).join(', ')
  return `<ol class="seal-line" aria-label="Seal line">
${station('signature', authors.length > 1 ? 'Signed by the authors' : 'Signed by author', [names(authors), zonedTime(lastTime(authors), zone)])}
${station('arrow', 'Submitted', [`to ${names(witnesses)}`, zonedTime(lastTime(authors), zone)])}
${station('half', 'Countersigned', [names(witnesses), zonedTime(lastTime(witnesses), zone)])}
${station('full', 'Sealed in the ledger', [`event ${seal.sequence}`, zonedTime(seal.time, zone)], bodySha256)}
</ol>`
}

function station(drawing: keyof typeof drawings, name: string, lines: string[], sha256?: string): string {
  const glyph = `<svg width="23" height="23" viewBox="0 0 23 23" aria-hidden="true"><g fill="none" stroke="#000" stroke-width="1.6">${drawings[drawing]}</g></svg>`
  const mark = sha256
    ? `<span class="mark"><img src="${fringeUrl(sha256)}" width="28" height="28" alt="Fringe mark for ${sha256.slice(0, 8)}"><span class="fig">${sha256.slice(0, 4)} ${sha256.slice(4, 8)}</span></span>`
    : ''
  return `<li><span class="node">${glyph}</span><b>${text(name)}</b>${lines.map((line) => `<span>${text(line)}</span>`).join('')}${mark}</li>`
}
