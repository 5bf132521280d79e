import fs from 'node:fs'
import path from 'node:path'
import { standIns } from './configuration.mjs'
import { freePort } from './ports.mjs'
import { readyByMessage, readyWhen } from './processes.mjs'
import { root } from './root.mjs'

const loader = new URL('./typescript.mjs', import.meta.url).href

/** How this Node runs a TypeScript file of the checkout. */
export function typescript(file, ...args) {
  return { command: process.execPath, args: ['--import', loader, path.join(root, file), ...args], cwd: root }
}

/** Starts the object store and the other stand-ins that this environment wants; answers their ports. */
export async function startStandIns(processes, { environment, dataFolder, secrets, onDeath }) {
  const wanted = standIns(environment)
  const [storage, codeHost, smtp, inbox, stamps] = await Promise.all(Array.from({ length: 5 }, freePort))
  const ports = { storage, codeHost, smtp, inbox, stamps }
  const fakes = wanted.filter((name) => ['code-host', 'mail', 'stamps'].includes(name))
  await Promise.all([
    wanted.includes('storage') &&
      startStorage(processes, { environment, dataFolder, secrets, port: storage, onDeath }),
    fakes.length > 0 && startFakes(processes, { environment, dataFolder, secrets, fakes, ports, onDeath }),
  ])
  return ports
}

function startStorage(processes, { environment, dataFolder, secrets, port, onDeath }) {
  const folder = path.join(dataFolder, 'objects')
  fs.mkdirSync(folder, { recursive: true, mode: 0o700 })
  return processes.start('storage', {
    ...typescript('storage-fake/main.ts'),
    env: {
      ...environment,
      STORAGE_FOLDER: folder,
      STORAGE_PORT: String(port),
      STORAGE_ACCESS_KEY: 'halfsilver',
      STORAGE_SECRET_KEY: secrets.storage,
      STORAGE_REGION: 'us-east-1',
    },
    ready: readyWhen(() => answers(`http://127.0.0.1:${port}/`)),
    onDeath,
  })
}

function startFakes(processes, { environment, dataFolder, secrets, fakes, ports, onDeath }) {
  const folder = path.join(dataFolder, 'fakes')
  fs.mkdirSync(path.join(folder, 'stamps'), { recursive: true, mode: 0o700 })
  return processes.start('fakes', {
    ...typescript('server/fakes/main.ts'),
    env: {
      ...environment,
      FAKES: fakes.join(','),
      FAKES_FOLDER: folder,
      OAUTH_CLIENT_ID: 'halfsilver',
      OAUTH_CLIENT_SECRET: secrets.oauth,
      CODE_HOST_PORT: String(ports.codeHost),
      SMTP_PORT: String(ports.smtp),
      INBOX_PORT: String(ports.inbox),
      TSA_PORT: String(ports.stamps),
    },
    ready: readyByMessage,
    onDeath,
  })
}

/** True when something answers HTTP there, whatever it says. */
export async function answers(url) {
  try {
    await fetch(url, { signal: AbortSignal.timeout(2000) })
    return true
  } catch {
    return false
  }
}
