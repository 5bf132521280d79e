import { unzlibSync } from 'fflate'
import { indexOfBytes } from '../bytes.ts'
import { sha256Hex, toHex } from '../digest.ts'
import { utf8Bytes } from '../utf8.ts'
import type { PayloadOf } from '../event-payloads.ts'
import type { Case } from './case.ts'
import { chainKey, eventsOf } from './check-events.ts'
import type { EntryStory } from './check-chain.ts'
import { reachedFrom } from './check-keys.ts'
import type { VerifiedSignature } from './check-signatures.ts'
import { need, present } from './report.ts'

type Chains = PayloadOf<'entry.rendered'>['chains']

/** entry.rendered: made once after the seal, names every rendition and result file, and where the other chains ended. */
export function checkRendered(
  c: Case,
  folder: string,
  story: EntryStory,
  signers: ReadonlySet<string>,
): void {
  const [rendered, ...more] = eventsOf(story.events, 'entry.rendered')
  const { event, payload } = present(
    rendered,
    'no entry.rendered at or before the head: not sealed as this bundle counts',
  )
  need(more.length === 0, 'rendered more than once')
  const sealed = present(eventsOf(story.events, 'entry.sealed')[0], 'not sealed')
  need(event.sequence > sealed.event.sequence, 'rendered before the seal')
  checkRenderedFiles(c, folder, payload.files)
  checkRenderedChains(c, folder, payload.chains, event.sequence, dueChains(c, story, signers))
}

function checkRenderedFiles(c: Case, folder: string, files: PayloadOf<'entry.rendered'>['files']): void {
  const names = files.map((file) => file.name)
  const sorted = [...new Set(names)].sort()
  need(names.join('\n') === sorted.join('\n'), 'files of entry.rendered are not in order')
  const listed = new Map(files.map((file) => [file.name, file.sha256]))
  const there = [...c.paths]
    .filter((path) => path.startsWith(folder))
    .map((path) => path.slice(folder.length))
  const due = new Set([
    'entry.pdf',
    'entry.html',
    ...there.filter((name) => name.startsWith('calculations/')),
  ])
  for (const name of [...new Set([...names, ...due])].sort()) {
    c.report.check('rendered digest', folder + name, () => {
      need(due.has(name), 'named by entry.rendered, but no rendition or result, or absent')
      need(listed.has(name), 'not named by entry.rendered')
      need(c.call(folder + name), 'file is absent')
      need(c.file(folder + name).sha256 === listed.get(name), 'not what entry.rendered names')
    })
  }
}

/** Subjects whose chain ends entry.rendered must name: the keys that its signers lead to, and what it amends. */
function dueChains(c: Case, story: EntryStory, signers: ReadonlySet<string>): Set<string> {
  const keys = [...reachedFrom(c, signers)].flatMap((digest) => c.keys.get(digest) ?? [])
  const due = new Set(keys.map((key) => chainKey('key', key.enrolment.id)))
  const { amends } = story.record.entry
  if (amends) due.add(chainKey('entry', amends.entryId))
  return due
}

function checkRenderedChains(
  c: Case,
  folder: string,
  chains: Chains,
  at: number,
  due: ReadonlySet<string>,
): void {
  const named = new Set(chains.map((chain) => chainKey(chain.kind, chain.id)))
  need(named.size === chains.length, 'a chain stands twice in entry.rendered')
  const same = named.size === due.size && [...named].every((key) => due.has(key))
  need(same, 'chains of entry.rendered are not those of its keys and of what it amends')
  const leftOut = c.leftOut('entry')
  for (const chain of chains) {
    c.report.check('chain end', `${folder}ledger/events.jsonl: ${chain.kind} ${chain.id}`, () => {
      const events = c.chains.get(chainKey(chain.kind, chain.id))
      if (!events && chain.kind === 'entry' && leftOut.has(chain.id)) return
      const last = present(
        events?.[chain.subjectSequence - 1],
        'chain in the bundle is shorter than at the seal',
      )
      need(last.digest === chain.digest, 'chain in the bundle is another than at the seal')
      const next = events?.[chain.subjectSequence]
      need(!next || next.event.sequence > at, 'entry.rendered names a shorter chain than there was')
    })
  }
}

const streamStart = utf8Bytes('stream')
const streamEnd = utf8Bytes('endstream')

/** Streams of a PDF, as they lie and unpacked where they are deflated (ISO 32000-1 section 7.3.8). */
function pdfStreams(pdf: Uint8Array): Uint8Array[] {
  const streams: Uint8Array[] = []
  for (let at = indexOfBytes(pdf, streamStart); at >= 0; at = indexOfBytes(pdf, streamStart, at)) {
    let start = at + streamStart.length
    if (pdf[start] === 13) start++
    if (pdf[start] !== 10) {
      at = start
      continue
    }
    const end = indexOfBytes(pdf, streamEnd, start + 1)
    if (end < 0) break
    const lying = pdf.subarray(start + 1, end)
    streams.push(...withoutLineEnd(lying), ...unpacked(lying))
    at = end + streamEnd.length
  }
  return streams
}

/**
 * A line end may stand before `endstream` and is no part of the stream; but a stream may itself end in such a byte, so each
 * reading counts. Packed data know their own end.
 */
function withoutLineEnd(bytes: Uint8Array): Uint8Array[] {
  const ends = [bytes.length]
  if (bytes.at(-1) === 10) ends.push(bytes.length - 1)
  if (bytes.at(-1) === 10 && bytes.at(-2) === 13) ends.push(bytes.length - 2)
  if (bytes.at(-1) === 13) ends.push(bytes.length - 1)
  return ends.map((end) => bytes.subarray(0, end))
}

function unpacked(packed: Uint8Array): Uint8Array[] {
  try {
    return [unzlibSync(packed)]
  } catch {
    return []
  }
}

/** Each living record.json is attached to the PDF as `<folder>-record.json`; both are looked for among the streams. */
export function checkAttachments(pdf: Uint8Array, living: readonly VerifiedSignature[]): void {
  need(indexOfBytes(pdf.subarray(0, 8), utf8Bytes('%PDF-')) === 0, 'no PDF')
  const streams = pdfStreams(pdf)
  const digests = new Set(streams.map(sha256Hex))
  for (const signature of living) {
    const name = `${signature.name}-record.json`
    need(digests.has(signature.recordSha256), `record.json of ${signature.name} is not attached`)
    const forms = nameForms(name)
    const named = [pdf, ...streams].some((bytes) => forms.some((form) => indexOfBytes(bytes, form) >= 0))
    need(named, `nothing is attached as ${name}`)
  }
}

/** Ways in which a PDF may write a file name: plain, UTF-16, and either as hex digits. */
function nameForms(name: string): Uint8Array[] {
  const plain = utf8Bytes(name)
  const wide = new Uint8Array(plain.length * 2)
  plain.forEach((byte, i) => (wide[i * 2 + 1] = byte))
  const hex = toHex(wide)
  return [plain, wide, utf8Bytes(hex), utf8Bytes(hex.toUpperCase()), utf8Bytes(toHex(plain))]
}
