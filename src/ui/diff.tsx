import type { ReactNode } from 'react'

export type DiffPiece = { kind: 'same' | 'del' | 'ins'; text: string }
export type DiffLine = {
  /** What changed: a paragraph "¶2", a block "C1", "+" for a new file. */
  sign: string
  pieces?: DiffPiece[]
  /** Anything that is not text, such as a new file's name. */
  children?: ReactNode
}

/** What changed, a line each: struck and quiet what went, on a soft ground what came. */
export function Diff({ label, lines }: { label: string; lines: DiffLine[] }) {
  return (
    <ul className="hs-diff" aria-label={label}>
      {lines.map((line, at) => (
        <li key={at}>
          <span className="hs-diff-sign">{line.sign}</span>
          <span>
            {line.pieces?.map((piece, each) => (
              <Piece key={each} piece={piece} />
            ))}
            {line.children}
          </span>
        </li>
      ))}
    </ul>
  )
}

function Piece({ piece }: { piece: DiffPiece }) {
  if (piece.kind === 'del') return <del>{piece.text}</del>
  if (piece.kind === 'ins') return <ins>{piece.text}</ins>
  return <>{piece.text}</>
}
