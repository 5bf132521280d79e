import { createContext, useContext, type ReactNode } from 'react'

/** A figure that can be quoted in a sentence. */
export interface QuotableFigure {
  calculationId: string
  pointer: string
  /** C2 */
  calculation: string
  /** What it is: g2(0) */
  name: string
  /** 3.45 ± 0.13 ns */
  text: string
}

/** What the editor shows and asks for but does not fetch itself; the page gives it. */
export interface EditorParts {
  /** A block; `succeed` puts the calculation that takes its place into the text. */
  calculation(calculationId: string, placeActs: ReactNode, succeed: (successorId: string) => void): ReactNode
  quote(calculationId: string, pointer: string): ReactNode
  imageAddress(fileId: string): string
  figures: QuotableFigure[]
  /** Asks for a calculation; the page inserts the block when it is started. */
  askForCalculation(): void
  /** Asks for a picture from this computer; the page inserts it when it is stored. */
  askForPicture(): void
  /** Asks for the address of a link; the editor holds the selection meanwhile. */
  openLink(href: string): void
}

const Context = createContext<EditorParts | null>(null)
export const EditorPartsProvider = Context.Provider

export function useEditorParts(): EditorParts {
  const parts = useContext(Context)
  if (!parts) throw new Error('The editor stands outside its parts.')
  return parts
}
