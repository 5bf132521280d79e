import { Readable } from 'node:stream'
import { ZipArchive } from 'archiver'
import type { Bundle } from '../../ledger-format/bundle/index.ts'

/** Raw files up to this size are packed from memory, so that their headers hold sizes and checksums at once. */
const IN_MEMORY_BYTES = 8_000_000

/**
 * The bundle as a zip stream: stored, not compressed, in the bundle's order, with one date, so that the same bundle gives the
 * same bytes. Each raw file is opened when its turn comes; memory stays flat whatever their size.
 */
export function zipBundle(
  bundle: Bundle,
  date: Date,
  openRaw: (fileId: string) => Promise<Readable>,
): Readable {
  const zip = new ZipArchive({ store: true })
  // Errors of parts are warnings to the library; a bundle with a part missing must not come into being.
  zip.on('warning', (error: Error) => zip.destroy(error))
  void packAll(zip, bundle, date, openRaw).catch((error: Error) => zip.destroy(error))
  return zip
}

async function packAll(
  zip: ZipArchive,
  { files }: Bundle,
  date: Date,
  openRaw: (fileId: string) => Promise<Readable>,
): Promise<void> {
  for (const file of files) {
    const source = 'bytes' in file ? Buffer.from(file.bytes) : await rawSource(file, openRaw)
    await packed(zip, source, { name: file.path, date, mode: 0o644 })
  }
  await zip.finalize()
}

async function rawSource(
  file: { raw: string; size: string },
  openRaw: (fileId: string) => Promise<Readable>,
): Promise<Buffer | Readable> {
  const stream = await openRaw(file.raw)
  if (Number(file.size) > IN_MEMORY_BYTES) return stream
  const parts: Buffer[] = []
  for await (const part of stream) parts.push(part as Buffer)
  return Buffer.concat(parts)
}

/** Resolves when the entry is written: the next raw stream is not opened before. */
function packed(
  zip: ZipArchive,
  source: Buffer | Readable,
  entry: { name: string; date: Date; mode: number },
): Promise<void> {
  return new Promise((resolve, reject) => {
    if (source instanceof Readable) source.once('error', reject)
    zip.once('error', reject)
    zip.once('entry', () => {
      zip.removeListener('error', reject)
      resolve()
    })
    zip.append(source, entry)
  })
}
