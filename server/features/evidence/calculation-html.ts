import { typographic } from '../../contract/quantity-text.ts'
import { escapeHtml } from '../../document/index.ts'
import type { RecordCalculation } from '../../ledger-format/record-body.ts'
import { labelHtml } from './label-html.ts'
import type { SheetCalculation, SheetInput } from './sheet-input.ts'
import { zonedTime } from './words.ts'

/** A calculation as it stands in the text of a print: what was computed from what, the picture, the figures, its origin. */
export function calculationHtml(input: SheetInput, calculationId: string): string {
  const signed = input.body.calculations.find(({ id }) => id === calculationId)
  const drawn = input.calculations.find(({ id }) => id === calculationId)
  if (!signed || !drawn) throw new Error(`The calculation ${calculationId} is not part of the signed entry.`)
  return [
    `<header><span class="fig">${signed.label}</span> <b>${escapeHtml(drawn.title)}</b><span class="from">${escapeHtml(inputNames(input, signed))}</span></header>`,
    `<p class="small">${escapeHtml(drawn.parameters)}</p>`,
    drawn.svg ? `<div class="plot">${inlineSvg(drawn)}</div>` : '',
    figuresTable(signed),
    signed.notes
      .map(({ detail, code }) => `<p class="small">Note: ${escapeHtml(detail ?? code)}</p>`)
      .join(''),
    `<p class="small fig">engine ${escapeHtml(signed.engine)}, ${escapeHtml(signed.kind)} version ${signed.version}, computed ${escapeHtml(zonedTime(signed.finishedAt, input.zone))}, result ${signed.resultSha256.slice(0, 16)}</p>`,
  ].join('\n')
}

function inputNames({ body }: SheetInput, { inputs }: RecordCalculation): string {
  const names = inputs.map((item) => {
    if (!('fileId' in item)) return `result ${item.resultSha256.slice(0, 8)}`
    const name = body.files.find(({ id }) => id === item.fileId)?.name ?? `file ${item.sha256.slice(0, 8)}`
    return item.homeEntry ? `${name} of ${item.homeEntry.number}` : name
  })
  return names.join(', ')
}

function figuresTable({ figures }: RecordCalculation): string {
  if (figures.length === 0) return ''
  const rows = figures.map(
    ({ label, value, u, unit }) =>
      `<tr><th scope="row">${labelHtml(label)}</th><td class="fig">${escapeHtml(typographic(value, u))}${unit && unit !== '1' ? ` ${escapeHtml(unit)}` : ''}</td></tr>`,
  )
  return `<table class="figures"><tbody>${rows.join('')}</tbody></table>`
}

/** The drawing inside the page; the ids in it are made unique, since a sheet may hold several. */
function inlineSvg({ svg, label }: SheetCalculation): string {
  return (svg ?? '')
    .replace(/^<\?xml[^>]*\?>\s*/, '')
    .replaceAll('figure-title', `${label}-title`)
    .replaceAll('figure-description', `${label}-description`)
}
