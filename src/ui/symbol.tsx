import type { ReactNode } from 'react'

export type SymbolPart = { text: string; level: 'base' | 'sub' | 'sup' }

/**
 * Splits a symbol in the short notation of figure axes and results, "g^(2)(τ)", "t_1", "g_{H}^{(2)}(0)": after ^ or _
 * comes one letter, a group in braces, or a group in round brackets, which are kept.
 */
export function symbolParts(symbol: string): SymbolPart[] {
  const parts: SymbolPart[] = []
  const pattern = /([_^])(?:\{([^}]*)\}|(\([^)]*\))|(.))|([^_^]+)/gu
  for (const [, mark, braced, bracketed, single, base] of symbol.matchAll(pattern)) {
    const text = base ?? braced ?? bracketed ?? single ?? ''
    parts.push({ text, level: mark === '_' ? 'sub' : mark === '^' ? 'sup' : 'base' })
  }
  return parts
}

/** Runs of letters, which are set in the italic of the text face, and runs of anything else, which are not. */
export function letterRuns(text: string): { text: string; italic: boolean }[] {
  return (text.match(/\p{L}+|\P{L}+/gu) ?? []).map((run) => ({ text: run, italic: /^\p{L}/u.test(run) }))
}

/** A physical symbol in running text: letters italic, digits and brackets upright. */
export function Symbol({ children }: { children: string }) {
  return <>{symbolParts(children).map(partNode)}</>
}

function partNode(part: SymbolPart, at: number): ReactNode {
  if (part.level === 'sup') return <sup key={at}>{part.text}</sup>
  if (part.level === 'sub') return <sub key={at}>{part.text}</sub>
  return letterRuns(part.text).map((run, each) =>
    run.italic ? (
      <i key={`${at}-${each}`} className="hs-var">
        {run.text}
      </i>
    ) : (
      run.text
    ),
  )
}
