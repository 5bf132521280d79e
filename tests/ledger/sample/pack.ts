import { zipSync } from 'fflate'
import { bagFiles, digested } from '../../../server/ledger-format/bundle/bag.ts'
import { signMessage } from '../../../server/ledger-format/ed25519.ts'
import {
  verifyBundle,
  type VerifyOptions,
  type VerifyReport,
} from '../../../server/ledger-format/verify/index.ts'

export type Files = ReadonlyMap<string, Uint8Array>

/** A stored zip with fixed dates. */
export function pack(topFolder: string, files: Files): Uint8Array {
  const options = { level: 0, mtime: new Date(2026, 0, 1) } as const
  const named = [...files].map(([path, bytes]): [string, [Uint8Array, typeof options]] => [
    `${topFolder}/${path}`,
    [bytes, options],
  ])
  return zipSync(Object.fromEntries(named))
}

/** Makes manifests, bag info and the one signature anew, as whoever holds the ledger key could. */
export function signedAnew(topFolder: string, files: Files, ledgerSeed: Uint8Array): Files {
  return remade(topFolder, files, (bytes) => signMessage(ledgerSeed, bytes))
}

/** Makes manifests and bag info anew and keeps the old signature, as anybody could. */
export function manifestsRedone(topFolder: string, files: Files): Files {
  const old = files.get('signature/tagmanifest-sha256.sig') ?? new Uint8Array()
  return remade(topFolder, files, () => old)
}

function remade(topFolder: string, files: Files, sign: (bytes: Uint8Array) => Uint8Array): Files {
  const payload = [...files].filter(([path]) => path.startsWith('data/'))
  const info = {
    organization: 'Ridgeway Photonics Laboratory',
    topFolder,
    date: topFolder.slice(-10),
    description: 'changed by a test',
  }
  const bag = bagFiles(
    payload.map(([path, bytes]) => digested(path, bytes)),
    info,
    sign,
  )
  return new Map([...files, ...bag.map(({ path, bytes }): [string, Uint8Array] => [path, bytes])])
}

export function verifyBytes(zip: Uint8Array, options: VerifyOptions = {}): Promise<VerifyReport> {
  return verifyBundle(
    { size: zip.length, read: (offset, length) => zip.subarray(offset, offset + length) },
    options,
  )
}
