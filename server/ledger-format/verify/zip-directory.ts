import { foldedName } from '../bundle/layout.ts'
import { utf8Text } from '../utf8.ts'
import { need, Wrong } from './report.ts'

/** Bytes of a bundle; reading may be asynchronous (a File in a browser). Lengths never pass the size. */
export interface BundleSource {
  size: number
  read: (offset: number, length: number) => Uint8Array | Promise<Uint8Array>
}

/** An entry of the zip's central directory (APPNOTE 6.3, section 4.3.12). */
export interface ZipEntry {
  name: string
  nameBytes: Uint8Array
  flags: number
  method: number
  crc: number
  packedSize: number
  size: number
  /** Where its local header begins. */
  offset: number
  /** High half of the external attributes: the file's mode on Unix. */
  mode: number
}

export interface ZipDirectory {
  entries: ZipEntry[]
  /** Where the directory begins. */
  start: number
}

const endLength = 22

/** Little-endian fields of a header. */
export class Fields {
  private readonly view: DataView

  constructor(bytes: Uint8Array) {
    this.view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  }

  u16(at: number): number {
    return this.view.getUint16(at, true)
  }

  u32(at: number): number {
    return this.view.getUint32(at, true)
  }

  u64(at: number): number {
    const value = this.view.getBigUint64(at, true)
    if (value > BigInt(Number.MAX_SAFE_INTEGER)) throw new Wrong('a size in the zip is beyond reason')
    return Number(value)
  }
}

/**
 * Reads the central directory. The end record must be the last 22 bytes: no comment, nothing after it.
 * @throws Wrong when this is no zip, or one with something after its directory.
 */
export async function readDirectory(source: BundleSource): Promise<ZipDirectory> {
  need(source.size >= endLength, 'not a zip that can be read')
  const end = new Fields(await source.read(source.size - endLength, endLength))
  need(
    end.u32(0) === 0x06054b50 && end.u16(20) === 0,
    'not a zip that can be read, or bytes after its directory',
  )
  const place = await directoryPlace(source, end)
  need(
    place.start + place.size === place.end,
    'the directory is not where the end record says, or something follows it',
  )
  const bytes = await source.read(place.start, place.size)
  const entries: ZipEntry[] = []
  let at = 0
  while (at < bytes.length) {
    const [entry, length] = readEntry(bytes.subarray(at))
    entries.push(entry)
    at += length
  }
  need(entries.length === place.count, 'the directory has another number of entries than its end record says')
  return { entries, start: place.start }
}

interface Place {
  start: number
  size: number
  count: number
  /** Where the records after the directory begin. */
  end: number
}

async function directoryPlace(source: BundleSource, end: Fields): Promise<Place> {
  const plain = { start: end.u32(16), size: end.u32(12), count: end.u16(10), end: source.size - endLength }
  const wide = plain.start === 0xffffffff || plain.size === 0xffffffff || plain.count === 0xffff
  if (!wide || source.size < endLength + 20 + 56) return plain
  const locator = new Fields(await source.read(plain.end - 20, 20))
  if (locator.u32(0) !== 0x07064b50) return plain
  const at = locator.u64(8)
  need(at + 56 === plain.end - 20, 'the zip64 end record is not where its locator says')
  const record = new Fields(await source.read(at, 56))
  need(record.u32(0) === 0x06064b50, 'the zip64 end record is damaged')
  return { start: record.u64(48), size: record.u64(40), count: record.u64(32), end: at }
}

function readEntry(bytes: Uint8Array): [entry: ZipEntry, length: number] {
  need(bytes.length >= 46, 'the directory is cut short')
  const fields = new Fields(bytes)
  need(fields.u32(0) === 0x02014b50, 'the directory is damaged')
  const [nameLength, extraLength, commentLength] = [fields.u16(28), fields.u16(30), fields.u16(32)]
  const length = 46 + nameLength + extraLength + commentLength
  need(bytes.length >= length, 'the directory is cut short')
  const nameBytes = bytes.subarray(46, 46 + nameLength)
  const entry: ZipEntry = {
    name: decodeName(nameBytes, fields.u16(8)),
    nameBytes,
    flags: fields.u16(8),
    method: fields.u16(10),
    crc: fields.u32(16),
    packedSize: fields.u32(20),
    size: fields.u32(24),
    offset: fields.u32(42),
    mode: fields.u16(40),
  }
  return [withWideSizes(entry, bytes.subarray(46 + nameLength, 46 + nameLength + extraLength)), length]
}

const isUtf8 = (flags: number) => (flags & 0x800) !== 0

function decodeName(bytes: Uint8Array, flags: number): string {
  // Without the flag the old code page would be meant; beyond ASCII no two tools agree on it, so such a name is refused below.
  return isUtf8(flags) ? utf8Text(bytes) : String.fromCharCode(...bytes)
}

/** Sizes from the zip64 extra field, where the plain fields are full. */
function withWideSizes(entry: ZipEntry, extra: Uint8Array): ZipEntry {
  const wide = { ...entry }
  const fields = new Fields(extra)
  for (let at = 0; at + 4 <= extra.length; at += 4 + fields.u16(at + 2)) {
    if (fields.u16(at) !== 1) continue
    let next = at + 4
    for (const key of ['size', 'packedSize', 'offset'] as const) {
      if (entry[key] !== 0xffffffff) continue
      wide[key] = fields.u64(next)
      next += 8
    }
  }
  return wide
}

export const isFolder = (entry: ZipEntry): boolean => entry.name.endsWith('/')

/**
 * What is wrong with an entry's name or kind (shapes 2, "Strict"): odd characters, a path that leaves the folder, a link,
 * a name that stands twice ignoring case. `seen` collects the names so far.
 */
export function checkEntry(entry: ZipEntry, seen: Map<string, string>): void {
  const { name } = entry
  const folded = foldedName(name)
  const twin = seen.get(folded)
  seen.set(folded, name)
  need(twin === undefined, `name stands twice: ${twin}`)
  // eslint-disable-next-line no-control-regex -- control characters are what is looked for
  need(!/[\x00-\x1f\x7f\\:]/.test(name), 'odd characters in the name')
  need(
    isUtf8(entry.flags) || entry.nameBytes.every((byte) => byte < 0x80),
    'name is neither ASCII nor marked as UTF-8',
  )
  const segments = name.replace(/\/$/, '').split('/')
  need(
    segments.every((segment) => !['', '.', '..'].includes(segment)),
    'path leaves the folder',
  )
  const type = entry.mode >> 12
  need(type === 0 || type === (isFolder(entry) ? 4 : 8), 'a link or special file')
  need(
    (entry.flags & 0x2041) === 0 && (entry.method === 0 || entry.method === 8),
    'encrypted or oddly packed',
  )
}
