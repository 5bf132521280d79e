import { escapeHtml, renderHtml, type NormalDocument } from '../../document/index.ts'
import { fontCss, mathsCss } from './assets.ts'
import { calculationHtml } from './calculation-html.ts'
import type { SheetInput } from './sheet-input.ts'
import { filesPart, historyPart, runsPart, sealPart, signaturesPart, titlePart } from './sheet-parts.ts'
import { pageCss, sheetCss } from './style.ts'

/** The signed characters of a quoted figure, then the unit that the record gives it. */
function quoteInFull({ quotes, calculations }: SheetInput['body'], nodeId: string): string {
  const quote = quotes.find((each) => each.nodeId === nodeId)
  if (quote === undefined) return ''
  const figures = calculations.find((each) => each.id === quote.calculationId)?.figures
  const unit = figures?.find((each) => each.pointer === quote.pointer)?.unit
  return unit && unit !== '1' ? `${quote.shown} ${unit}` : quote.shown
}

/**
 * A sealed sheet as one HTML file that needs nothing from outside and runs nothing: what is printed to PDF and lies in the
 * bundle. Its own policy admits no request.
 */
export function sheetHtml(input: SheetInput): string {
  const { body } = input
  const text = renderHtml(body.content as unknown as NormalDocument, {
    calculation: (id) => calculationHtml(input, id),
    quote: (nodeId) => quoteInFull(body, nodeId),
    image: (fileId) => input.images.get(fileId) ?? '',
  })
  const page = pageCss({
    laboratory: body.laboratory.name,
    notebook: `Notebook ${body.notebook.number}, ${body.notebook.title}`,
    number: body.entry.number,
    bodySha256: input.bodySha256,
    demo: body.laboratory.demo,
  })
  const policy =
    "default-src 'none'; style-src 'unsafe-inline'; img-src data:; font-src data:; base-uri 'none'; form-action 'none'"
  const maths = text.includes('class="maths"') ? mathsCss() : ''
  return `<!doctype html>
<html lang="en-GB">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(`${body.entry.number} ${body.entry.title}`)}</title>
<style>
${fontCss()}
${maths}
${sheetCss}
${page}
</style>
</head>
<body>
${titlePart(input)}
${runsPart(input)}
<main>
${text}
${unplaced(input)}
</main>
${filesPart(input)}
${historyPart(input)}
${signaturesPart(input)}
${sealPart(input)}
</body>
</html>
`
}

/** Calculations that the text only quotes stand after it, so that every signed result is printed. */
function unplaced(input: SheetInput): string {
  const placed = new Set<string>()
  JSON.stringify(
    input.body.content,
    (_key, value: { type?: string; attrs?: { calculationId?: string } } | null) => {
      if (value?.type === 'calculation' && value.attrs?.calculationId) placed.add(value.attrs.calculationId)
      return value
    },
  )
  const rest = input.body.calculations.filter(({ id }) => !placed.has(id))
  if (rest.length === 0) return ''
  const blocks = rest.map(({ id }) => `<section class="calculation">${calculationHtml(input, id)}</section>`)
  return `<h2>Calculations quoted above</h2>${blocks.join('\n')}`
}
