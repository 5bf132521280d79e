import { existsSync } from 'node:fs'
import { join, resolve } from 'node:path'

/**
 * Path of a file of the shared reference data (exact answers, published vectors), which lies beside the checkout in
 * `../shared/reference`, or in the folder named by HALFSILVER_REFERENCE.
 */
export function referencePath(name: string): string {
  const root = resolve(import.meta.dirname, '../..')
  const folders = [process.env.HALFSILVER_REFERENCE, join(root, '../shared/reference')].filter((f) => f !== undefined)
  const found = folders.map((folder) => join(folder, name)).find((path) => existsSync(path))
  if (found === undefined) throw new Error(`Reference file ${name} was looked for in ${folders.join(' and ')} and is not there.`)
  return found
}
