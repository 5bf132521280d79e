import type { Figure } from '../contract/figure.ts'

/** The data table of a figure as CSV: header `name / unit`, one row a line, LF, full digits; a gap is an empty field. */
export function figureCsv(figure: Figure): string {
  const header = figure.table.columns.map(({ name, unit }) => field(`${name} / ${unit}`))
  const rows = figure.table.rows.map((row) => row.map((cell) => (cell === null ? '' : field(String(cell)))))
  return [header, ...rows].map((cells) => `${cells.join(',')}\n`).join('')
}

/** Quoted where a comma, quote or line break would be misread (RFC 4180). */
function field(text: string): string {
  return /[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
}
