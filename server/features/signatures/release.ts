import { readFileSync } from 'node:fs'

const manifest = JSON.parse(readFileSync(new URL('../../../package.json', import.meta.url), 'utf8')) as {
  version: string
}

/** Release of the product, as named in every signature and bundle. */
export const release = manifest.version
