import { strToU8, Zip, ZipDeflate, ZipPassThrough } from 'fflate'
import { describe, expect, it } from 'vitest'
import { sha256Hex } from '../../server/ledger-format/digest.ts'
import { readArchive } from '../../server/ledger-format/verify/archive.ts'
import { Report } from '../../server/ledger-format/verify/report.ts'
import { Crc32 } from '../../server/ledger-format/verify/crc32.ts'

const text = strToU8('line of a file\n'.repeat(300))
type Named = [name: string, bytes: Uint8Array]
const usual: Named[] = [
  ['top/bagit.txt', text],
  ['top/data/a.txt', text],
  ['top/data/entries/N-07-001/raw/tags.csv', text],
]

/** A zip in which names may stand twice; packers that stream write sizes after the data. */
function zip(files: readonly Named[], streamed = false): Uint8Array {
  const pieces: Uint8Array[] = []
  const archive = new Zip((error, piece) => {
    if (error) throw error
    pieces.push(piece)
  })
  for (const [name, bytes] of files) {
    const file = streamed ? new ZipDeflate(name) : new ZipPassThrough(name)
    archive.add(file)
    file.push(bytes, true)
  }
  archive.end()
  return new Uint8Array(Buffer.concat(pieces))
}

async function read(bytes: Uint8Array) {
  const report = new Report()
  const archive = await readArchive(
    {
      size: bytes.length,
      read: (offset, length) => Promise.resolve(bytes.subarray(offset, offset + length)),
    },
    report,
  )
  return { archive, failed: report.checks.filter((check) => check.ok === false) }
}

const find = (bytes: Uint8Array, wanted: string, from = 0) =>
  Buffer.from(bytes).indexOf(wanted, from, 'latin1')

function changed(bytes: Uint8Array, at: number, by: number): Uint8Array {
  const copy = bytes.slice()
  copy[at] = by
  return copy
}

describe('a zip', () => {
  it.each([false, true])('is read with digests and bytes (streamed and deflated: %s)', async (streamed) => {
    const { archive, failed } = await read(zip(usual, streamed))
    expect(failed).toEqual([])
    expect(archive?.topFolder).toBe('top')
    expect(archive?.files.get('data/a.txt')).toMatchObject({
      size: text.length,
      sha256: sha256Hex(text),
      bytes: text,
    })
    // Of raw files only digests are kept: they may be larger than memory.
    expect(archive?.files.get('data/entries/N-07-001/raw/tags.csv')).toMatchObject({
      sha256: sha256Hex(text),
      bytes: null,
    })
  })

  const plain = zip(usual)
  const directory = find(plain, 'PK\u0001\u0002')
  const end = find(plain, 'PK\u0005\u0006')
  const secondData = find(plain, 'line of', find(plain, 'data/a.txt'))

  it.each<[string, Uint8Array, string]>([
    ['no zip', strToU8('x'.repeat(100)), 'zip'],
    ['empty', new Uint8Array(), 'zip'],
    ['cut short', plain.subarray(0, -30), 'zip'],
    ['with bytes after it', new Uint8Array([...plain, 1]), 'zip'],
    ['with bytes before it', new Uint8Array([1, ...plain]), 'zip'],
    ['with a comment', new Uint8Array([...changed(plain, plain.length - 2, 2), 104, 105]), 'zip'],
    ['with hidden bytes before its directory', hidden(), 'zip has no gaps'],
    ['with another name before the data', changed(plain, find(plain, 'bagit.txt'), 66), 'zip has no gaps'],
    ['with data that does not fit its checksum', changed(plain, secondData, 76), 'zip data'],
    ['with an encrypted file', changed(plain, directory + 8, (plain[directory + 8] ?? 0) | 1), 'zip entry'],
    ['with a link', changed(plain, directory + 41, 0xa1), 'zip entry'],
    ['with a name twice', zip([...usual, ['top/bagit.txt', text]]), 'zip entry'],
    ['with a name twice in other case', zip([...usual, ['top/BAGIT.txt', text]]), 'zip entry'],
    [
      'with a name twice in other Unicode form',
      zip([
        ['top/\u00e9', text],
        ['top/e\u0301', text],
      ]),
      'zip entry',
    ],
    ['with a path that leaves the folder', zip([...usual, ['top/../x', text]]), 'zip entry'],
    ['with a backslash', zip([...usual, ['top/data\\x', text]]), 'zip entry'],
    ['with a second top folder', zip([...usual, ['other/x', text]]), 'zip'],
    ['with a file beside the top folder', zip([...usual, ['x', text]]), 'zip'],
    ['with an empty folder', zip([...usual, ['top/hollow/', new Uint8Array()]]), 'layout'],
  ])('%s is refused', async (_, bytes, check) => {
    const { failed } = await read(bytes)
    expect(failed.map((failure) => failure.name)).toContain(check)
  })

  function hidden(): Uint8Array {
    const moved = new Uint8Array([
      ...plain.subarray(0, directory),
      ...strToU8('hidden'),
      ...plain.subarray(directory),
    ])
    new DataView(moved.buffer).setUint32(end + 6 + 16, directory + 6, true)
    return moved
  }

  it('that unpacks to more than it says is stopped', async () => {
    const packed = zip([['top/a', new Uint8Array(1 << 20)]], true)
    const at = find(packed, 'PK\u0001\u0002')
    new DataView(packed.buffer).setUint32(at + 24, 1000, true)
    const { failed } = await read(packed)
    expect(failed.map((failure) => failure.detail)).toContain('longer than the directory says')
  })
})

describe('CRC-32', () => {
  it('has the published check value', () => {
    // Check value of CRC-32/ISO-HDLC over "123456789" (common practice).
    const crc = new Crc32()
    crc.update(strToU8('123'))
    crc.update(strToU8('456789'))
    expect(crc.value).toBe(0xcbf43926)
  })
})
