import type { ReactNode } from 'react'
import { classNames } from './class-names.ts'

export type StateName =
  | 'draft'
  | 'signed'
  | 'with-witness'
  | 'returned'
  | 'sealed'
  | 'withdrawn'
  | 'queued'
  | 'running'
  | 'done'
  | 'stale'
  | 'failed'
  | 'ok'
  | 'note'
  | 'fault'

type Shape = { word: string; tone?: 'good' | 'warn' | 'fault'; drawing: ReactNode }

const line = 'hs-glyph-line'
const octagon = 'M4.5 1.5H9.5L12.5 4.5V9.5L9.5 12.5H4.5L1.5 9.5V4.5Z'
const cross = 'M4.8 4.8L9.2 9.2M9.2 4.8L4.8 9.2'

const shapes: Record<StateName, Shape> = {
  draft: { word: 'Draft', drawing: <path className={`${line} hs-glyph-dashed`} d="M2 2H12V12H2Z" /> },
  signed: { word: 'Signed', drawing: <path className={line} d="M2 2H12V12H2ZM2 12L12 2" /> },
  'with-witness': {
    word: 'With witness',
    drawing: (
      <>
        <path className={line} d="M2 2H12V12H2ZM2 12L12 2" />
        <path className="hs-glyph-solid" d="M2 2H12L2 12Z" />
      </>
    ),
  },
  returned: {
    word: 'Returned',
    tone: 'warn',
    drawing: <path className={line} d="M12 2H2V12H12M7 4L4 7L7 10M4 7H13" />,
  },
  sealed: {
    word: 'Sealed',
    drawing: (
      <>
        <path className="hs-glyph-solid" d="M2 2H12V12H2Z" />
        <path className="hs-glyph-cut" d="M2 12L12 2" />
      </>
    ),
  },
  withdrawn: { word: 'Withdrawn', drawing: <path className={line} d="M2 2H12V12H2ZM4 7H10" /> },
  queued: { word: 'Queued', drawing: <circle className={`${line} hs-glyph-dashed`} cx="7" cy="7" r="5" /> },
  running: {
    word: 'Running',
    drawing: (
      <>
        <circle className={line} cx="7" cy="7" r="5" />
        <path className="hs-glyph-solid" d="M7 2A5 5 0 0 1 7 12Z" />
      </>
    ),
  },
  done: {
    word: 'Done',
    tone: 'good',
    drawing: (
      <>
        <circle className="hs-glyph-solid" cx="7" cy="7" r="5.5" />
        <path className="hs-glyph-cut" d="M4.5 7L6.5 9L9.8 5" />
      </>
    ),
  },
  stale: {
    word: 'Out of date',
    tone: 'warn',
    drawing: (
      <>
        <circle className={line} cx="7" cy="7" r="5" />
        <path className={line} d="M3 11L11 3" />
      </>
    ),
  },
  failed: { word: 'Failed', tone: 'fault', drawing: <path className={line} d={octagon + cross} /> },
  ok: { word: 'Holds', tone: 'good', drawing: <path className={line} d="M2 7.5L5.5 11L12 3.5" /> },
  note: { word: 'Note', tone: 'warn', drawing: <path className={line} d="M7 2L13 12H1ZM7 6V9" /> },
  fault: { word: 'Fails', tone: 'fault', drawing: <path className={line} d={octagon + cross} /> },
}

/**
 * A state as a drawing and a word. The word can be replaced ("Running, 64 %") or, where the row says it already, kept
 * for the ear alone.
 */
export function StateGlyph({
  state,
  children,
  wordless,
}: {
  state: StateName
  children?: ReactNode
  wordless?: boolean
}) {
  const { word, tone, drawing } = shapes[state]
  return (
    <span className={classNames('hs-state', tone && `hs-tone-${tone}`)}>
      <svg
        width="14"
        height="14"
        viewBox="0 0 14 14"
        aria-hidden={!wordless || undefined}
        role={wordless ? 'img' : undefined}
      >
        {wordless && <title>{word}</title>}
        {drawing}
      </svg>
      {!wordless && (children ?? word)}
    </span>
  )
}
