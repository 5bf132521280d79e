import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import type { Config } from '../../platform/config.ts'
import { openAtRest, sealAtRest } from './at-rest.ts'

type KeySettings = Pick<Config, 'dataFolder' | 'secret'>

/** The laboratory's own private keys; PKCS#8 of the authority's, the 32-byte seed of the ledger's. */
export type LaboratoryKey = 'certificate-authority' | `ledger-${string}`

function fileOf(config: KeySettings, name: LaboratoryKey): string {
  return path.join(config.dataFolder, 'keys', `${name}.key`)
}

/** Stores a private key under `<data>/keys`, wrapped, readable by the owner alone; an existing file is never replaced. */
export function storeKey(config: KeySettings, name: LaboratoryKey, key: Uint8Array): void {
  mkdirSync(path.join(config.dataFolder, 'keys'), { recursive: true, mode: 0o700 })
  writeFileSync(fileOf(config, name), sealAtRest(config.secret, name, key), { mode: 0o600, flag: 'wx' })
}

export function loadKey(config: KeySettings, name: LaboratoryKey): Buffer {
  return openAtRest(config.secret, name, readFileSync(fileOf(config, name)))
}

/** Takes back a key that was stored for something that then failed. */
export function removeKey(config: KeySettings, name: LaboratoryKey): void {
  rmSync(fileOf(config, name))
}
