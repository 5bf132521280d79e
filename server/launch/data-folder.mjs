import { createHash, randomBytes } from 'node:crypto'
import fs from 'node:fs'
import path from 'node:path'
import { startTime } from './processes.mjs'
import { Refusal } from './say.mjs'

/** Makes the folder of all local state. */
export function openDataFolder(folder) {
  try {
    fs.mkdirSync(folder, { recursive: true, mode: 0o711 })
    fs.accessSync(folder, fs.constants.W_OK | fs.constants.X_OK)
  } catch (error) {
    throw new Refusal(
      `The data folder ${folder} cannot be written (${error.code}). Name another one: HALFSILVER_DATA=/path npm start`,
    )
  }
  return fs.realpathSync(folder)
}

/** Refuses a second product on one data folder; a lock left by a killed process is taken over. Answers the release. */
export function lockDataFolder(folder) {
  const file = path.join(folder, 'lock')
  const own = JSON.stringify({ pid: process.pid, since: startTime(process.pid) })
  for (let attempt = 0; attempt < 2; attempt++) {
    try {
      fs.writeFileSync(file, own, { flag: 'wx' })
      return () => fs.rmSync(file, { force: true })
    } catch (error) {
      if (error.code !== 'EEXIST') throw error
      const holder = readLock(file)
      if (holder.since !== null && startTime(holder.pid) === holder.since)
        throw new Refusal(
          `Halfsilver already runs on the data folder ${folder} (process ${holder.pid}). Stop it first, or name another folder: HALFSILVER_DATA=/path npm start`,
        )
      fs.rmSync(file, { force: true })
    }
  }
  throw new Refusal(`The data folder ${folder} is being opened by another process. Try again.`)
}

function readLock(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'))
  } catch {
    return { pid: 0, since: null }
  }
}

/** Passwords and keys of this installation, made by chance at its first start, readable by its owner alone. */
export function secretsOf(folder) {
  const file = path.join(folder, 'secrets.json')
  if (!fs.existsSync(file)) {
    const secret = () => randomBytes(32).toString('hex')
    const names = ['superuser', 'owner', 'app', 'worker', 'session', 'atRest', 'storage', 'oauth']
    const made = {
      id: randomBytes(6).toString('hex'),
      ...Object.fromEntries(names.map((name) => [name, secret()])),
    }
    fs.writeFileSync(file, JSON.stringify(made, null, 2), { mode: 0o600 })
  }
  return JSON.parse(fs.readFileSync(file, 'utf8'))
}

/** Sixteen hex characters that stand for a path. */
export function pathDigest(folder) {
  return createHash('sha256').update(folder).digest('hex').slice(0, 16)
}
