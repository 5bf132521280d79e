import { Inflate } from 'fflate'
import { sameBytes } from '../bytes.ts'
import { pureDigester, type Digester } from '../digest.ts'
import { Crc32 } from './crc32.ts'
import { need, type Report, Wrong } from './report.ts'
import {
  checkEntry,
  Fields,
  isFolder,
  readDirectory,
  type BundleSource,
  type ZipDirectory,
  type ZipEntry,
} from './zip-directory.ts'
import { concatBytes } from '@noble/hashes/utils.js'

/** A file of the bundle after its one reading. */
export interface ArchiveFile {
  size: number
  sha256: string
  sha512: string
  /** Null for raw files, of which only digests are kept, and for what is too large for its kind. */
  bytes: Uint8Array | null
}

export interface Archive {
  topFolder: string
  /** By path relative to the top folder; damaged files are not here. */
  files: ReadonlyMap<string, ArchiveFile>
  /** Every path of the zip under the top folder, damaged files too. */
  paths: ReadonlySet<string>
}

const chunkSize = 1 << 20
const largestDocument = 1 << 28
const isRaw = (path: string) => /^data\/entries\/[^/]+\/raw\//.test(path)

/**
 * Reads a bundle once, from front to back, and keeps digests of all files and bytes of all but the raw ones. Reports
 * names, gaps, links and damaged data. Answers null when this is no zip.
 */
export async function readArchive(
  source: BundleSource,
  report: Report,
  digester: Digester = pureDigester,
): Promise<Archive | null> {
  let directory: ZipDirectory
  try {
    directory = await readDirectory(source)
  } catch (error) {
    report.fail('zip', 'bundle.zip', error)
    return null
  }
  const { entries } = directory
  const topFolder = checkTopFolder(entries, report)
  const seen = new Map<string, string>()
  for (const entry of entries) report.check('zip entry', entry.name, () => checkEntry(entry, seen))
  await reportGaps(source, directory, report)
  const under = entries.filter((entry) => !isFolder(entry) && entry.name.startsWith(`${topFolder}/`))
  const files = new Map<string, ArchiveFile>()
  for (const entry of under) {
    const path = entry.name.slice(topFolder.length + 1)
    try {
      files.set(path, await readFile(source, entry, !isRaw(path), digester))
      report.add('zip data', path, true)
    } catch (error) {
      report.fail('zip data', path, error)
    }
  }
  reportEmptyFolders(entries, report)
  return { topFolder, files, paths: new Set(under.map((entry) => entry.name.slice(topFolder.length + 1))) }
}

function checkTopFolder(entries: readonly ZipEntry[], report: Report): string {
  const tops = [...new Set(entries.map((entry) => entry.name.split('/')[0] ?? ''))].sort()
  report.check('zip', 'bundle.zip', () => {
    const inFolder = entries.every((entry) => entry.name.includes('/'))
    need(tops.length === 1 && inFolder, `entries outside the one top folder: ${tops.join(', ')}`)
  })
  return tops[0] ?? ''
}

function reportEmptyFolders(entries: readonly ZipEntry[], report: Report): void {
  for (const folder of entries.filter(isFolder)) {
    report.check('layout', folder.name, () => {
      need(
        entries.some((entry) => !isFolder(entry) && entry.name.startsWith(folder.name)),
        'empty folder',
      )
    })
  }
}

async function reportGaps(source: BundleSource, directory: ZipDirectory, report: Report): Promise<void> {
  try {
    await checkGaps(source, directory)
    report.add('zip has no gaps', 'bundle.zip', true)
  } catch (error) {
    report.fail('zip has no gaps', 'bundle.zip', error)
  }
}

/** Entries follow one another, local names equal the directory's, and nothing lies before, between or after. */
async function checkGaps(source: BundleSource, { entries, start }: ZipDirectory): Promise<void> {
  let at = 0
  let before: ZipEntry | null = null
  for (const entry of [...entries].sort((a, b) => a.offset - b.offset)) {
    await checkGap(source, at, entry.offset, before, entry.name)
    const local = await readLocalHeader(source, entry)
    need(sameBytes(local.nameBytes, entry.nameBytes), `local name differs: ${entry.name}`)
    at = local.dataStart + entry.packedSize
    before = entry
  }
  await checkGap(source, at, start, before, 'the directory')
}

/** Between two entries only the data descriptor of the first may stand (sizes written after the data). */
async function checkGap(
  source: BundleSource,
  from: number,
  to: number,
  before: ZipEntry | null,
  next: string,
): Promise<void> {
  if (from === to) return
  const length = to - from
  need(
    before !== null && (before.flags & 8) !== 0 && [12, 16, 20, 24].includes(length),
    `hidden bytes before ${next}`,
  )
  const bytes = new Fields(await source.read(from, length))
  const crcAt = length === 16 || length === 24 ? 4 : 0
  need(
    bytes.u32(crcAt) === before.crc && (crcAt === 0 || bytes.u32(0) === 0x08074b50),
    `hidden bytes before ${next}`,
  )
}

async function readLocalHeader(
  source: BundleSource,
  entry: ZipEntry,
): Promise<{ nameBytes: Uint8Array; dataStart: number }> {
  need(entry.offset + 30 <= source.size, 'the zip is cut short')
  const fields = new Fields(await source.read(entry.offset, 30))
  need(fields.u32(0) === 0x04034b50, `no local header: ${entry.name}`)
  const [nameLength, extraLength] = [fields.u16(26), fields.u16(28)]
  const dataStart = entry.offset + 30 + nameLength + extraLength
  need(dataStart + entry.packedSize <= source.size, 'the zip is cut short')
  return { nameBytes: await source.read(entry.offset + 30, nameLength), dataStart }
}

async function readFile(
  source: BundleSource,
  entry: ZipEntry,
  keep: boolean,
  digester: Digester,
): Promise<ArchiveFile> {
  const sink = new FileSink(entry, keep && entry.size < largestDocument, digester)
  const { dataStart } = await readLocalHeader(source, entry)
  const inflate = entry.method === 8 ? new Inflate((piece) => sink.take(piece)) : null
  for (let done = 0; done < entry.packedSize; done += chunkSize) {
    const piece = await source.read(dataStart + done, Math.min(chunkSize, entry.packedSize - done))
    if (inflate) inflate.push(piece, done + piece.length >= entry.packedSize)
    else sink.take(piece)
  }
  return sink.end()
}

/** Takes a file's bytes in pieces: digests, checksum, and the bytes themselves where they are wanted. */
class FileSink {
  private readonly sha256
  private readonly sha512
  private readonly crc = new Crc32()
  private readonly pieces: Uint8Array[] = []
  private size = 0

  constructor(
    private readonly entry: ZipEntry,
    private readonly keep: boolean,
    digester: Digester,
  ) {
    this.sha256 = digester('sha256')
    this.sha512 = digester('sha512')
  }

  take(piece: Uint8Array): void {
    this.size += piece.length
    if (this.size > this.entry.size) throw new Wrong('longer than the directory says')
    this.crc.update(piece)
    this.sha256.update(piece)
    this.sha512.update(piece)
    if (this.keep) this.pieces.push(piece.slice())
  }

  end(): ArchiveFile {
    need(this.size === this.entry.size, 'shorter than the directory says')
    need(this.crc.value === this.entry.crc, 'the checksum in the zip does not fit')
    return {
      size: this.size,
      sha256: this.sha256.hex(),
      sha512: this.sha512.hex(),
      bytes: this.keep ? concatBytes(...this.pieces) : null,
    }
  }
}
