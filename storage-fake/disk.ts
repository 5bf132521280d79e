import { randomBytes } from 'node:crypto'
import { open, readdir, readFile, rename, rm } from 'node:fs/promises'
import { dirname, join } from 'node:path'

/** Makes a rename or removal in a folder survive a power cut. */
async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r')
  try {
    await handle.sync()
  } finally {
    await handle.close()
  }
}

/** Moves a file that is already flushed to its final name. */
export async function moveInto(from: string, to: string): Promise<void> {
  await rename(from, to)
  await syncFolder(dirname(to))
}

/** Writes JSON so that a reader or a crash sees the old content or the new, nothing between. */
export async function writeJson(path: string, value: unknown, tempFolder: string): Promise<void> {
  const temp = tempName(tempFolder)
  const handle = await open(temp, 'wx')
  try {
    await handle.writeFile(JSON.stringify(value, null, 1))
    await handle.sync()
  } finally {
    await handle.close()
  }
  try {
    await moveInto(temp, path)
  } catch (error) {
    await rm(temp, { force: true })
    throw error
  }
}

/** Content of a JSON file; null when there is no such file. */
export async function readJson<T>(path: string): Promise<T | null> {
  try {
    return JSON.parse(await readFile(path, 'utf8')) as T
  } catch (error) {
    if (isMissing(error)) return null
    throw error
  }
}

/** Names in a folder, sorted; none when there is no such folder. */
export async function namesIn(folder: string): Promise<string[]> {
  try {
    return (await readdir(folder)).sort()
  } catch (error) {
    if (isMissing(error)) return []
    throw error
  }
}

export function isMissing(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ENOENT'
}

export function tempName(folder: string): string {
  return join(folder, randomBytes(12).toString('hex'))
}
