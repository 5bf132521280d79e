import type { ReactNode } from 'react'
import type { SignedRecord } from '../../../../server/ledger-format/record.ts'
import { figureInFull, sizeText } from '../../../lib/format-quantity.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { Digest, groupedDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'

/** The digest of what is signed, in full, with its mark. */
export function SignedDigest({ record }: { record: SignedRecord }) {
  return (
    <div className="flex flex-wrap items-start gap-x-4.5 gap-y-3">
      <FringeMark sha256={record.bodySha256} size={84} />
      <div className="min-w-0 flex-1 basis-64">
        <p className="hs-quiet">
          You sign exactly this sheet: <span className="hs-fig">{record.entry.number}</span>, revision{' '}
          <span className="hs-fig">{record.entry.revision}</span>
        </p>
        <p className="hs-fig hs-digest-full mt-1 leading-relaxed">
          <span className="block">{groupedDigest(record.bodySha256.slice(0, 32))}</span>{' '}
          <span className="block">{groupedDigest(record.bodySha256.slice(32))}</span>
        </p>
      </div>
    </div>
  )
}

/** Everything the signature binds, read out of the bytes themselves: files, calculations, quoted results, notes. */
export function WhatIsSigned({ record }: { record: SignedRecord }) {
  const notes = record.calculations.flatMap((each) =>
    each.notes.map((note) => ({ ...note, label: each.label })),
  )
  return (
    <div className="grid gap-4">
      <Part title="Text" count={record.entry.revision} counted="revision">
        <p>
          {record.authors.map((author) => author.name).join(', ')}; work of {record.entry.workDate}
          {record.entry.writtenTo && `, written until ${dateAndTime(record.entry.writtenTo)}`}
        </p>
        {record.entry.lateRemark && <p>Written late: {record.entry.lateRemark}</p>}
      </Part>
      <Part title="Files" count={record.files.length}>
        <ul>
          {record.files.map((file) => (
            <li key={file.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 py-1">
              <span className="min-w-0 flex-1 basis-40 break-words">{file.name}</span>
              <span className="hs-quiet hs-fig">{sizeText(Number(file.size))}</span>
              <Digest sha256={file.sha256} size={26} />
            </li>
          ))}
        </ul>
      </Part>
      <Part title="Calculations" count={record.calculations.length}>
        <ul>
          {record.calculations.map((each) => (
            <li key={each.id} className="grid grid-cols-[36px_minmax(0,1fr)] gap-x-2 py-1">
              <span className="hs-fig hs-quiet">{each.label}</span>
              <div>
                <p>
                  {each.kind}, engine {each.engine}
                </p>
                {each.figures.map((figure) => (
                  <p key={figure.pointer}>
                    {figure.label} <span className="hs-fig">{figureInFull(figure)}</span>
                  </p>
                ))}
              </div>
            </li>
          ))}
        </ul>
      </Part>
      {notes.length > 0 && (
        <Part title="Notes on quality" count={notes.length}>
          <ul>
            {notes.map((note) => (
              <li key={`${note.label} ${note.code}`} className="py-0.5">
                <StateGlyph state="note">{note.label}</StateGlyph> {note.detail ?? note.code}
                {note.answer && <span className="hs-quiet"> Answered: {note.answer}</span>}
              </li>
            ))}
          </ul>
        </Part>
      )}
      {record.signing.opened && <Opened record={record} opened={record.signing.opened} />}
    </div>
  )
}

function Opened({
  record,
  opened,
}: {
  record: SignedRecord
  opened: NonNullable<SignedRecord['signing']['opened']>
}) {
  const names = opened.map((each) => {
    if (each.kind === 'text') return 'the text'
    if (each.kind === 'file')
      return record.files.find((file) => file.id === each.id)?.name ?? 'a file no longer here'
    return (
      record.calculations.find((calculation) => calculation.id === each.id)?.label ??
      'a calculation no longer placed'
    )
  })
  return (
    <Part title="You opened" count={opened.length}>
      <p>{names.length === 0 ? 'Nothing here. The record will say so.' : names.join(', ')}</p>
    </Part>
  )
}

function Part({
  title,
  count,
  counted,
  children,
}: {
  title: string
  count: number
  counted?: string
  children: ReactNode
}) {
  return (
    <section>
      <h3 className="mb-1 flex items-baseline gap-2 text-3 font-semibold">
        {title}
        <span className="hs-section-count">{counted ? `${counted} ${count}` : count}</span>
      </h3>
      <div className="text-2">{count === 0 ? <p className="hs-quiet">none</p> : children}</div>
    </section>
  )
}
