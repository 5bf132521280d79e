import { useQueries } from '@tanstack/react-query'
import { useState } from 'react'
import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { Checkbox } from '../../../ui/checkbox.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { waitingWords } from '../../../ui/waiting-scale.tsx'
import { filesToSign } from '../entry-files.ts'
import { calculationQuery } from '../queries.ts'
import {
  checksOf,
  openablesOf,
  questions,
  stillToDo,
  type Openable,
  type QuestionCode,
} from '../review-checks.ts'
import { daysSince, dueDays } from '../waiting.ts'
import { CalculationPeek } from './calculation-peek.tsx'
import { ChecksList } from './checks-list.tsx'
import { CountersignAct } from './countersign-act.tsx'
import { FilePeek } from './file-peek.tsx'
import { ReturnAct } from './life-acts.tsx'
import type { SheetOnScreen } from './sign-act.tsx'

/**
 * Beside the sheet: what the program checked, what is to be opened and what was, the questions, and the two answers. The
 * text and the calculations count as opened once the sheet beside has read them; files are opened from here.
 */
export function ReviewPanel({
  sheet,
  zone,
  textOpened,
  now,
  onSigned,
  onReturned,
}: {
  sheet: SheetOnScreen
  zone: string
  /** The text is on the screen. */
  textOpened: boolean
  now: Date
  onSigned: (signature: EntrySignature) => void
  onReturned: () => void
}) {
  const { entry } = sheet
  const calculations = useQueries({
    queries: entry.calculations.map((each) => ({ ...calculationQuery(each.id), enabled: false })),
    combine: (results) => results.flatMap(({ data }) => data ?? []),
  })
  const [openedFiles, setOpenedFiles] = useState<string[]>([])
  const [answered, setAnswered] = useState<QuestionCode[]>([])
  const isOpened = (each: Openable) =>
    each.kind === 'text'
      ? textOpened
      : each.kind === 'file'
        ? openedFiles.includes(each.id)
        : calculations.some((calculation) => calculation.id === each.id)
  const openables = openablesOf(entry)
  const reason = stillToDo(
    openables.filter((each) => !isOpened(each)),
    questions.length - answered.length,
  )
  const mayWitness = entry.allowed.includes('witness:read')

  return (
    <section className="hs-sheet hs-panel" id="review" aria-label="Your review">
      <h2>Your review</h2>
      {entry.submittedAt && (
        <p className="hs-quiet mt-0.5">
          Submitted {dateAndTime(entry.submittedAt)}. Waiting{' '}
          {waitingWords(daysSince(entry.submittedAt, now), dueDays)}.
        </p>
      )}
      <h3>Checked by Halfsilver</h3>
      <ChecksList checks={checksOf(entry, calculations)} />
      {mayWitness && (
        <Opening
          openables={openables}
          isOpened={isOpened}
          sheet={sheet}
          onFile={(id) => setOpenedFiles((files) => [...files, id])}
        />
      )}
      {mayWitness && <Questions answered={answered} onAnswered={setAnswered} />}
      <div className="hs-actions mt-5">
        {entry.allowed.includes('return') && <ReturnAct entry={entry} onReturned={onReturned} />}
        <CountersignAct sheet={sheet} zone={zone} disabledReason={reason} onSigned={onSigned} />
      </div>
      {!mayWitness && <CannotWitness sheet={sheet} />}
    </section>
  )
}

function Opening({
  openables,
  isOpened,
  sheet,
  onFile,
}: {
  openables: Openable[]
  isOpened: (each: Openable) => boolean
  sheet: SheetOnScreen
  onFile: (id: string) => void
}) {
  const opened = openables.filter(isOpened).length
  return (
    <>
      <h3>
        Opened{' '}
        <span className="hs-quiet text-2 font-normal">
          {opened} of {openables.length}; your record lists them
        </span>
      </h3>
      <ul className="hs-checks">
        {openables.map((each) => {
          const file = filesToSign(sheet.entry).find((candidate) => candidate.id === each.id)
          return (
            <li key={each.id} className="items-start">
              {isOpened(each) ? <StateGlyph state="ok" wordless /> : <StateGlyph state="draft" wordless />}
              <span className="min-w-0 break-words">
                {file && <FilePeek file={file} onOpened={() => onFile(file.id)} />}
                {each.kind === 'calculation' && <CalculationPeek id={each.id} label={each.name} />}
                {each.kind === 'text' && each.name}
                {!isOpened(each) && <small>not opened yet</small>}
              </span>
            </li>
          )
        })}
      </ul>
    </>
  )
}

function Questions({
  answered,
  onAnswered,
}: {
  answered: QuestionCode[]
  onAnswered: (answered: QuestionCode[]) => void
}) {
  return (
    <fieldset>
      <legend className="contents">
        <h3>
          For you to check{' '}
          <span className="hs-quiet text-2 font-normal">
            {answered.length} of {questions.length}
          </span>
        </h3>
      </legend>
      <div className="grid gap-2">
        {questions.map(({ code, text }) => (
          <Checkbox
            key={code}
            label={text}
            checked={answered.includes(code)}
            onChange={(on) => onAnswered(on ? [...answered, code] : answered.filter((each) => each !== code))}
          />
        ))}
      </div>
    </fieldset>
  )
}

function CannotWitness({ sheet: { entry, me } }: { sheet: SheetOnScreen }) {
  const signed = entry.signatures.some(
    (each) => !each.voided && each.signer.personId === me.id && each.meaning !== 'authorship',
  )
  const words = signed
    ? 'You have countersigned this sheet.'
    : entry.phase === 'with-witness'
      ? 'You cannot witness this sheet: a witness is a supervisor of this notebook who wrote nothing in it and gave no run, file or calculation.'
      : 'This sheet does not wait for a witness.'
  return <p className="mt-4">{words}</p>
}
