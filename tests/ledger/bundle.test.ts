import { beforeAll, describe, expect, it } from 'vitest'
import { canonicalBytes, type Json } from '../../server/ledger-format/canonical-json.ts'
import {
  parseJson,
  sha256Hex,
  signMessage,
  toBase64,
  toHex,
  utf8Bytes,
  utf8Text,
} from '../../server/ledger-format/index.ts'
import type { BundleDescription } from '../../server/ledger-format/bundle/index.ts'
import { exitCodes, reportText, type VerifyReport } from '../../server/ledger-format/verify/index.ts'
import { askJudge, judgeIsThere } from './sample/judge.ts'
import { SampleLaboratory } from './sample/laboratory.ts'
import { manifestsRedone, pack, signedAnew, verifyBytes, type Files } from './sample/pack.ts'

const first = 'data/entries/N-07-001/'
const author = `${first}signatures/1-authorship/`
const witness = `${first}signatures/2-witness-present/`

let laboratory: SampleLaboratory
let topFolder: string
let files: Files
let ledgerSeed: Uint8Array

beforeAll(async () => {
  laboratory = await SampleLaboratory.open()
  ;({ topFolder, files } = await laboratory.files())
  ledgerSeed = laboratory.ledgerSeeds.at(-1) ?? new Uint8Array()
})

const failing = (report: VerifyReport, ok: boolean | null = false) =>
  report.checks.filter((check) => check.ok === ok).map((check) => check.path)
/** Failing lines as people read them. */
const lines = (report: VerifyReport) =>
  report.checks
    .filter((check) => check.ok === false)
    .map(({ name, path, detail }) => `${name}: ${path}: ${detail}`)
const names = (report: VerifyReport, path: string) => lines(report).some((line) => line.includes(path))
const asJson = (value: unknown) => parseJson(canonicalBytes(value))
const zipOf = (changed: Files) => pack(topFolder, changed)
const anew = (changed: Files) => signedAnew(topFolder, changed, ledgerSeed)

function flipped(path: string): Map<string, Uint8Array> {
  const bytes = (files.get(path) ?? new Uint8Array()).slice()
  bytes[bytes.length >> 1] = (bytes[bytes.length >> 1] ?? 0) ^ 1
  return new Map([...files, [path, bytes]])
}

function swapped(a: string, b: string): Map<string, Uint8Array> {
  const [x, y] = [files.get(a), files.get(b)]
  if (!x || !y) throw new Error(`${a} or ${b} is not in the sample`)
  return new Map([...files, [a, y], [b, x]])
}

describe('a bundle as built', () => {
  it('holds, and every check says where', async () => {
    const report = await verifyBytes(zipOf(files))
    expect(report.checks.filter((check) => check.ok !== true)).toEqual([])
    expect(report).toMatchObject({ verdict: 'holds', anchors: 'not-given' })
    expect(report.checks.length).toBeGreaterThan(400)
    expect(report.checks.every((check) => check.name !== '' && check.path !== '')).toBe(true)
  })

  it('is the same bytes when built again from the same state', async () => {
    const again = await laboratory.files()
    expect(toHex(zipOf(again.files))).toBe(toHex(zipOf(files)))
  })

  it('says first whose keys were not checked, and plainly who stamped', async () => {
    const text = reportText(await verifyBytes(zipOf(files)))
    expect(text.split('\n')[0]).toContain('whose keys these are was not checked: compare these digests')
    expect(text).toContain(
      sha256Hex(files.get('data/anchors.json') ?? new Uint8Array()).length === 64
        ? 'rootEnrolmentSha256'
        : '',
    )
    expect(text).toContain('by the laboratory’s own authority')
    expect(text).toContain('They prove nothing to outsiders.')
  })

  it('matches its laboratory’s anchors', async () => {
    const report = await verifyBytes(zipOf(files), { anchors: asJson(laboratory.anchors()) })
    expect(report).toMatchObject({ verdict: 'holds', anchors: 'matched' })
  })

  it.each(['selection', 'entry'] as const)('holds as a bundle of a %s', async (kind) => {
    const scope = kind === 'entry' ? { kind, number: 'N-07/001' } : { kind }
    const other = await laboratory.files({ scope })
    expect((await verifyBytes(pack(other.topFolder, other.files))).verdict).toBe('holds')
  })

  it('of the first entry alone holds under the head of that day', async () => {
    const input = await laboratory.bundleInput()
    const day = laboratory.heads[0]
    if (!day) throw new Error('the sample has no head')
    const alone = await laboratory.files({
      scope: { kind: 'entry', number: 'N-07/001' },
      entries: input.entries.slice(0, 1),
      head: day.head,
      headSignature: day.signature,
      headTimeStamp: day.timeStamp,
    })
    expect(failing(await verifyBytes(pack(alone.topFolder, alone.files)))).toEqual([])
  })

  it('of the addendum alone names what it amends', async () => {
    const input = await laboratory.bundleInput()
    const [amended] = input.entries
    const alone = await laboratory.files({
      scope: { kind: 'entry', number: 'N-07/002' },
      entries: input.entries.slice(1),
      leftOut: [{ kind: 'entry', id: amended?.entryId ?? '', number: 'N-07/001', reason: 'not-chosen' }],
    })
    const report = await verifyBytes(pack(alone.topFolder, alone.files))
    expect(report.verdict).toBe('holds')
    expect(report.checks.some((check) => check.detail.includes('N-07/001 left out: not-chosen'))).toBe(true)
  })

  it('is incomplete, not false, with raw files or stamps left out', async () => {
    const input = await laboratory.bundleInput()
    const entries = input.entries.map((entry) => ({
      ...entry,
      files: entry.files.map((file) => ({ ...file, leftOut: true })),
    }))
    const { files: bare } = await laboratory.files({ entries })
    const report = await verifyBytes(zipOf(bare))
    expect(report.verdict).toBe('incomplete')
    expect(failing(report, null)).toContain(`${first}raw/heralded.csv`)
    const stampless = input.entries.map((entry) => ({
      ...entry,
      signatures: entry.signatures.map((signature) => ({ ...signature, timeStamp: null })),
    }))
    const { files: pending } = await laboratory.files({ entries: stampless })
    const unstamped = await verifyBytes(zipOf(pending))
    expect(unstamped.verdict).toBe('incomplete')
    expect(failing(unstamped, null)).toContain(`${witness}timestamp.tsr`)
  })

  it.runIf(judgeIsThere)('holds for the independent judge too', () => {
    const answer = askJudge(zipOf(files), { '--anchors': canonicalBytes(laboratory.anchors()) })
    expect(answer.checks.filter((check) => check.ok !== true)).toEqual([])
    expect(answer.status).toBe(0)
  })
})

/** One file of each kind. */
const oneOfEachKind = () => {
  const kinds = new Map<string, string>()
  for (const path of files.keys()) {
    const kind = path.replace(/\/[0-9a-f-]{16,36}/g, '').replace(/N-07-00\d|\d-[a-z-]+(?=\/)/g, '')
    if (!kinds.has(kind)) kinds.set(kind, path)
  }
  return [...kinds.values()]
}

describe('one changed byte', { timeout: 180_000 }, () => {
  it('in any kind of file is found there', async () => {
    for (const path of oneOfEachKind()) {
      const report = await verifyBytes(zipOf(flipped(path)))
      expect(report.verdict, path).toBe('broken')
      expect(names(report, path), path).toBe(true)
    }
  })

  it('with manifests redone is found by the one signature', async () => {
    const kinds = /record\.(json|sig)$|enrolment\.sig$|raw\/heralded\.csv$|entry\.pdf$|bundle\.json$/
    for (const path of oneOfEachKind().filter((candidate) => kinds.test(candidate))) {
      const report = await verifyBytes(zipOf(manifestsRedone(topFolder, flipped(path))))
      expect(failing(report), path).toContain('signature/tagmanifest-sha256.sig')
    }
  })

  it('with all signed anew by the ledger key is still found, texts for people aside', async () => {
    // No event names these two files, nor the words of the crate: only the printed digest of the release can tell.
    const texts = ['data/VERIFY.md', 'data/check.html', 'data/ro-crate-metadata.json']
    const others = oneOfEachKind().filter((path) => path.startsWith('data/') && !texts.includes(path))
    for (const path of others) {
      const report = await verifyBytes(zipOf(anew(flipped(path))))
      expect(names(report, path), path).toBe(true)
    }
  })
})

/** Attacks by somebody who holds the ledger key: all is signed anew. Each with the path that must be named. */
const attacks: [title: string, path: string, change: () => Map<string, Uint8Array>][] = [
  [
    'signatures of author and witness exchanged',
    `${author}record.sig`,
    () => swapped(`${author}record.sig`, `${witness}record.sig`),
  ],
  [
    'records of author and witness exchanged',
    `${author}record.json`,
    () => swapped(`${author}record.json`, `${witness}record.json`),
  ],
  [
    'signature of another entry',
    `${author}record.sig`,
    () => swapped(`${author}record.sig`, 'data/entries/N-07-002/signatures/1-authorship/record.sig'),
  ],
  [
    'certificates exchanged',
    `${author}signer.pem`,
    () => swapped(`${author}signer.pem`, `${witness}signer.pem`),
  ],
  [
    'time stamps exchanged',
    `${author}timestamp.tsr`,
    () => swapped(`${author}timestamp.tsr`, `${witness}timestamp.tsr`),
  ],
  [
    'a living signature for the voided one',
    `${first}voided/1-authorship/record.json`,
    () => swapped(`${author}record.json`, `${first}voided/1-authorship/record.json`),
  ],
  [
    'voided signature taken out',
    `${first}ledger/events.jsonl`,
    () => new Map([...files].filter(([path]) => !path.startsWith(`${first}voided/`))),
  ],
  [
    'pdf of another entry',
    `${first}entry.pdf`,
    () => swapped(`${first}entry.pdf`, 'data/entries/N-07-002/entry.pdf'),
  ],
  [
    'events of another entry',
    `${first}ledger/events.jsonl`,
    () => swapped(`${first}ledger/events.jsonl`, 'data/entries/N-07-002/ledger/events.jsonl'),
  ],
  [
    'last event cut off',
    `${first}ledger/`,
    () =>
      new Map([...files, [`${first}ledger/events.jsonl`, withoutLastLine(`${first}ledger/events.jsonl`)]]),
  ],
  [
    'a figure changed in result.json',
    `${first}calculations/C1/result.json`,
    () => replaced(`${first}calculations/C1/result.json`, '0.02', '0.01'),
  ],
  [
    'a crate that gives digests',
    'data/ro-crate-metadata.json',
    () => replaced('data/ro-crate-metadata.json', '"name":"VERIFY.md"', '"name":"VERIFY.md","sha256":"0"'),
  ],
  [
    'a crate that names an absent file',
    'data/ro-crate-metadata.json',
    () => replaced('data/ro-crate-metadata.json', '"@id":"VERIFY.md","@type"', '"@id":"absent.md","@type"'),
  ],
  ['a file more', 'data/extra.txt', () => new Map([...files, ['data/extra.txt', utf8Bytes('more\n')]])],
  ['fetch.txt', 'fetch.txt', () => new Map([...files, ['fetch.txt', utf8Bytes('')]])],
  ['a foreign ledger key', 'data/ledger/keys/', () => swapped(...ledgerKeyPaths())],
  [
    'rotation left out',
    'data/ledger/rotations.jsonl',
    () => new Map([...files, ['data/ledger/rotations.jsonl', new Uint8Array()]]),
  ],
  [
    'head not as signed',
    'data/ledger/head.sig',
    () => replaced('data/ledger/head.json', '"epoch":1', '"epoch":2'),
  ],
  [
    'raw file under another name',
    `${first}raw/heralded.csv`,
    () => renamed(`${first}raw/heralded.csv`, `${first}raw/other.csv`),
  ],
  ['an entry that bundle.json does not name', 'data/entries/', () => described((d) => void d.entries.pop())],
  [
    'raw file said to be left out',
    `${first}raw/heralded.csv`,
    () =>
      described(
        (d) =>
          void d.leftOut.push({
            kind: 'raw',
            id: d.raw.find((r) => r.path.endsWith('heralded.csv'))?.fileId ?? '',
            number: null,
            reason: 'by-choice',
          }),
      ),
  ],
]

function ledgerKeyPaths(): [string, string] {
  const [a = '', b = ''] = [...files.keys()].filter((path) => path.startsWith('data/ledger/keys/'))
  return [a, b]
}

function withoutLastLine(path: string): Uint8Array {
  const lines = utf8Text(files.get(path) ?? new Uint8Array()).split('\n')
  return utf8Bytes(`${lines.slice(0, -2).join('\n')}\n`)
}

function replaced(path: string, old: string, by: string): Map<string, Uint8Array> {
  const text = utf8Text(files.get(path) ?? new Uint8Array())
  if (!text.includes(old)) throw new Error(`${path} does not hold ${old}`)
  return new Map([...files, [path, utf8Bytes(text.replace(old, by))]])
}

function renamed(from: string, to: string): Map<string, Uint8Array> {
  return new Map([...files].map(([path, bytes]) => [path === from ? to : path, bytes]))
}

function described(change: (description: BundleDescription) => void): Map<string, Uint8Array> {
  const description = asJson(
    parseJson(files.get('data/bundle.json') ?? new Uint8Array()),
  ) as unknown as BundleDescription
  change(description)
  return new Map([...files, ['data/bundle.json', canonicalBytes(description)]])
}

describe('attacks by whoever holds the ledger key', () => {
  it.each(attacks)('%s: %s', async (_, path, change) => {
    const report = await verifyBytes(zipOf(anew(change())))
    expect(report.verdict).toBe('broken')
    expect(failing(report).some((failed) => failed.startsWith(path))).toBe(true)
  })

  it.runIf(judgeIsThere)('are named alike by the independent judge', { timeout: 180_000 }, async () => {
    for (const [title, path, change] of attacks) {
      const zip = zipOf(anew(change()))
      const [answer, report] = [askJudge(zip), await verifyBytes(zip)]
      expect(answer.status, title).toBe(exitCodes[report.verdict])
      const named = answer.checks.filter((check) => check.ok === false).map((check) => check.path)
      expect(
        named.some((failed) => failed.startsWith(path)),
        title,
      ).toBe(true)
    }
  })
})

describe('what lies outside the bundle', () => {
  const last = () => {
    const head = laboratory.heads.at(-1)
    if (!head) throw new Error('the sample has no head')
    return head
  }
  const given = (head: object, signature: Uint8Array): Json =>
    asJson({ head, signature: toBase64(signature), timeStamp: null })
  const forged = (change: object): Json => {
    const head = { ...last().head, ...change }
    return given(head, signMessage(ledgerSeed, canonicalBytes(head)))
  }
  const proof = (from: number, to: number): Json =>
    asJson({ from, to, path: laboratory.tree().consistencyPath(from, to).map(toHex) })

  it('finds a bundle rebuilt with other keys, by the anchors alone', async () => {
    const other = await SampleLaboratory.open(' of somebody else')
    const rebuilt = await other.files()
    const zip = pack(rebuilt.topFolder, rebuilt.files)
    expect(await verifyBytes(zip)).toMatchObject({ verdict: 'holds', anchors: 'not-given' })
    const report = await verifyBytes(zip, { anchors: asJson(laboratory.anchors()) })
    expect(report).toMatchObject({ verdict: 'broken', anchors: 'different' })
    expect(failing(report)).toEqual(['--anchors'])
    expect(reportText(report).split('\n')[0]).toContain('DIFFERENT')
  })

  it.each([
    ['another laboratory', { laboratory: '00000000-0000-4000-8000-000000000000' }],
    ['another certificate authority', { caSha256: '0'.repeat(64) }],
    ['another root enrolment', { rootEnrolmentSha256: '0'.repeat(64) }],
    ['no time-stamp authority', { tsaRootsSha256: [] }],
    ['another ledger key', { ledgerKeysSha256: ['0'.repeat(64)] }],
    ['no ledger key', { ledgerKeysSha256: [] }],
  ])('calls anchors with %s different', async (_, change) => {
    const report = await verifyBytes(zipOf(files), {
      anchors: asJson({ ...laboratory.anchors(), ...change }),
    })
    expect(report).toMatchObject({ verdict: 'broken', anchors: 'different' })
  })

  it('takes anchors from before a rotation, and from after one more', async () => {
    const { ledgerKeysSha256 } = laboratory.anchors()
    for (const keys of [ledgerKeysSha256.slice(0, 1), [...ledgerKeysSha256, 'f'.repeat(64)]]) {
      const report = await verifyBytes(zipOf(files), {
        anchors: asJson({ ...laboratory.anchors(), ledgerKeysSha256: keys }),
      })
      expect(report.anchors).toBe('matched')
    }
  })

  it('compares heads', async () => {
    const [old] = laboratory.heads
    if (!old) throw new Error('the sample has no head')
    const sizes = [old.head.treeSize, last().head.treeSize] as const
    const zip = zipOf(files)
    const outcome = async (head: Json, consistency?: Json) =>
      (await verifyBytes(zip, { head, consistency })).verdict
    expect(await outcome(given(last().head, last().signature))).toBe('holds')
    expect(await outcome(given(last().head, new Uint8Array(64)))).toBe('broken')
    expect(await outcome(forged({ rootHash: '0'.repeat(64) }))).toBe('broken')
    expect(await outcome(forged({ epoch: 2 }))).toBe('incomplete')
    expect(await outcome(given(old.head, old.signature))).toBe('incomplete')
    expect(await outcome(given(old.head, old.signature), proof(...sizes))).toBe('holds')
    expect(await outcome(given(old.head, old.signature), proof(sizes[0] - 1, sizes[1]))).toBe('incomplete')
    const bent = { ...(proof(...sizes) as object), path: ['0'.repeat(64)] }
    expect(await outcome(given(old.head, old.signature), asJson(bent))).toBe('broken')
  })
})
