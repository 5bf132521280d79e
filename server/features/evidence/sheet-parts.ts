import { escapeHtml as text } from '../../document/index.ts'
import type { RecordBody } from '../../ledger-format/record-body.ts'
import { sealLine } from './seal-line.ts'
import type { SheetInput } from './sheet-input.ts'
import { durationWords, grouped, meaningWords, sizeWords, zonedTime } from './words.ts'

/** Title, people and dates at the head of the first page. */
export function titlePart({ body, zone }: SheetInput): string {
  const { entry } = body
  const authors = body.authors.map(({ name, exception }) =>
    exception ? `${name} (did not sign: ${exception.reason})` : name,
  )
  const written =
    entry.writtenFrom && entry.writtenTo
      ? ` Written from ${zonedTime(entry.writtenFrom, zone)} to ${zonedTime(entry.writtenTo, zone)}.`
      : ''
  const late = entry.lateRemark ? ` Remark on the dates: ${entry.lateRemark}` : ''
  const amends = entry.amends
    ? `<p class="meta">Addendum to ${text(entry.amends.number)}, whose signed body is <span class="fig">${grouped(entry.amends.bodySha256)}</span></p>`
    : ''
  return `<h1>${text(entry.title)}</h1>
<p class="meta">${text(authors.join(', '))}. Work date ${entry.workDate}.${text(written)}${text(late)} Revision ${entry.revision}.</p>${amends}${demoPart(body)}`
}

function demoPart({ laboratory }: RecordBody): string {
  return laboratory.demo
    ? '<p class="demo">Demonstration: the people of this laboratory are invented and the passphrase of their keys is published.</p>'
    : ''
}

export function runsPart({ body, zone }: SheetInput): string {
  return body.runs
    .map((run) => {
      const duration = run.durationPs ? `, ${durationWords(run.durationPs)}` : ''
      const apparatus = run.apparatus.map(({ name, role, channel }) =>
        [name, role, channel === null ? null : `channel ${channel}`].filter(Boolean).join(', '),
      )
      const conditions = run.conditions.map(
        ({ name, value, u, unit }) => `${name} ${value}${u ? ` ± ${u}` : ''}${unit ? ` ${unit}` : ''}`,
      )
      return `<section class="run"><b>Run ${text(run.number)}</b> ${text(run.experiment)}, begun ${text(zonedTime(run.startedAt, zone))}${text(duration)}.
${conditions.length > 0 ? ` ${text(conditions.join('; '))}.` : ''}${apparatus.length > 0 ? ` ${text(apparatus.join('; '))}.` : ''}</section>`
    })
    .join('\n')
}

export function filesPart({ body, names, zone }: SheetInput): string {
  if (body.files.length === 0) return ''
  const rows = body.files.map(
    (
      file,
    ) => `<tr><td>${text(file.name)}</td><td>${text(sizeWords(file.size))}</td><td>${text(names.get(file.uploadedBy) ?? file.uploadedBy)}, ${text(zonedTime(file.uploadedAt, zone))}${file.via === 'token' ? ', by a token' : ''}</td><td>${text(file.reading ? `${file.reading.format} ${file.reading.version}` : 'kept, not read')}</td></tr>
<tr class="digest"><td colspan="4" class="fig">SHA-256 ${grouped(file.sha256)}</td></tr>`,
  )
  return `<h2>Raw files</h2><table class="files"><thead><tr><th>Name</th><th>Size</th><th>Uploaded</th><th>Read as</th></tr></thead><tbody>${rows.join('')}</tbody></table>`
}

export function historyPart({ body, names, zone, signatures }: SheetInput): string {
  const { returns } = body.history
  const voided = signatures.filter((signature) => signature.voided)
  if (returns.length + voided.length === 0) return ''
  const lines = [
    ...returns.map(
      ({ bySubjectId, reason, time }) =>
        `Given back by ${names.get(bySubjectId) ?? bySubjectId}, ${zonedTime(time, zone)}: ${reason ?? 'no reason given'}`,
    ),
    ...voided.map(
      (signature) =>
        `Void: ${meaningWords[signature.meaning]} by ${signature.signer.name}, ${zonedTime(signature.time, zone)}`,
    ),
  ]
  return `<h2>History</h2><ul class="history">${lines.map((line) => `<li>${text(line)}</li>`).join('')}</ul>`
}

/** Each living signature with printed name, time with zone, meaning and the whole sentence (21 CFR 11.50). */
export function signaturesPart({ signatures, zone }: SheetInput): string {
  const living = signatures.filter((signature) => !signature.voided)
  const items = living.map(
    ({
      meaning,
      signer,
      time,
      statement,
      recordSha256,
      timeStamp,
    }) => `<section class="signature"><p><b>${text(meaningWords[meaning])}</b></p>
<p class="name">${text(signer.name)}, ${text(signer.role)}</p><p>${text(zonedTime(time, zone))}</p><blockquote>${text(statement)}</blockquote>
<p class="small">${text(stampWords(timeStamp, zone))}</p><p class="small fig">record ${grouped(recordSha256)}</p></section>`,
  )
  return `<h2>Signatures</h2><div class="signatures">${items.join('\n')}</div>`
}

function stampWords(stamp: SheetInput['signatures'][number]['timeStamp'], zone: string): string {
  if (stamp.status === 'pending' || stamp.time === null)
    return 'Not yet time-stamped when this print was made; the stamp is in the bundle once it came.'
  const whose = stamp.independent
    ? `by ${stamp.authority}`
    : "by the laboratory's own authority, which proves nothing to outsiders"
  return `Time stamp ${whose}: ${zonedTime(stamp.time, zone)}`
}

export function sealPart(input: SheetInput): string {
  const { seal, bodySha256 } = input
  return `<section class="seal">${sealLine(input)}
<p class="small fig">event ${grouped(seal.digest)}</p><p class="small fig">sheet ${grouped(bodySha256)}</p>
<p class="small">What was signed is record.json of each signature, attached to the PDF of this sheet; this page is the laboratory's rendering of it.</p></section>`
}
