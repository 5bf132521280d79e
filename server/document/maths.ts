import katex, { type KatexOptions } from 'katex'

/** No links, no HTML from formulae, and bounds on macros and sizes (rulings.md B11). */
export function mathsOptions(display: boolean): KatexOptions {
  return {
    displayMode: display,
    output: 'htmlAndMathml',
    trust: false,
    strict: true,
    maxExpand: 1000,
    maxSize: 20,
    throwOnError: true,
  }
}

/** A formula as HTML with MathML beside it; a formula that cannot be set is given as its source. */
export function mathsHtml(latex: string, display: boolean, escape: (text: string) => string): string {
  try {
    return katex.renderToString(latex, mathsOptions(display))
  } catch {
    return `<code class="maths-source">${escape(latex)}</code>`
  }
}
