import { spawn } from 'node:child_process'
import fs from 'node:fs'
import path from 'node:path'
import { createInterface } from 'node:readline'
import { removeCluster, startCluster } from './cluster.mjs'
import { isDemo, productEnvironment, standIns, workerEnvironment } from './configuration.mjs'
import { lockDataFolder, openDataFolder, secretsOf } from './data-folder.mjs'
import { digestOf } from './digest.mjs'
import { isFree } from './ports.mjs'
import { endLeftovers, pause, Processes, readyByMessage } from './processes.mjs'
import { Refusal } from './say.mjs'
import { typescript, startStandIns } from './services.mjs'

/**
 * Starts database and stand-ins on a data folder and brings the database up to date.
 * @param given `dataFolder`, `port`, `environment`, `fast` (tests: a database without safety against power cuts), `tell`
 *   (hears each line of progress), `signal` (gives up the start: what runs already is stopped and the start throws)
 * @returns `{ url, env, workerEnv, ports, processes, stop }`
 */
export async function startServices({
  dataFolder: folder,
  port,
  environment = process.env,
  fast = false,
  tell,
  signal,
}) {
  const dataFolder = openDataFolder(folder)
  const release = lockDataFolder(dataFolder)
  const processes = new Processes(dataFolder)
  const stop = async () => {
    await processes.stop()
    release()
  }
  try {
    await endLeftovers(dataFolder)
    forgetHalfDemo(dataFolder, tell)
    if (!(await isFree(port)))
      throw new Refusal(`Port ${port} is in use. Take another one: PORT=${port + 1} npm start`)
    const secrets = secretsOf(dataFolder)
    tell('Starting database, object store, mail and sign-in')
    const [database, ports] = await Promise.all([
      standIns(environment).includes('database') &&
        startCluster(processes, dataFolder, secrets, { fast, onDeath: tell }),
      startStandIns(processes, { environment, dataFolder, secrets, onDeath: tell }),
    ])
    const demo = isDemo(environment)
    const env = productEnvironment({ environment, port, dataFolder, secrets, database, ports, demo })
    signal?.throwIfAborted()
    await bringUpToDate({ env, dataFolder, clusterFolder: database?.folder, demo, tell, signal })
    signal?.throwIfAborted()
    return { url: env.PUBLIC_ORIGIN, env, workerEnv: workerEnvironment(env), ports, processes, stop }
  } catch (error) {
    await stop()
    throw error
  }
}

/** Starts the whole product and waits until it can be used. */
export async function startProduct(given) {
  const services = await startServices(given)
  const { processes, env, workerEnv, stop } = services
  const shared = { ready: readyByMessage, onDeath: given.tell }
  try {
    given.tell('Starting the notebook')
    await Promise.all([
      processes.start('worker', { ...typescript('server/worker.ts'), env: workerEnv, ...shared }),
      processes.start('api', { ...typescript('server/main.ts'), env, ...shared }),
    ])
    given.signal?.throwIfAborted()
    await untilReady(`http://127.0.0.1:${env.PORT}/readyz`)
    return services
  } catch (error) {
    await stop()
    throw error
  }
}

async function untilReady(url) {
  for (let i = 0; i < 200; i++) {
    const answer = await fetch(url).catch(() => null)
    if (answer?.ok) return
    await pause(100)
  }
  throw new Error(`The product does not become ready: ${await (await fetch(url)).text()}`)
}

/** Migrates, and loads the demonstration where it belongs; a private database that had both before is left alone. */
async function bringUpToDate({ env, dataFolder, clusterFolder, demo, tell, signal }) {
  const note = clusterFolder && path.join(clusterFolder, 'migrated')
  const wanted = digestOf(['server/platform/db', 'server/platform/queue/queues.ts'])
  if (note && fs.existsSync(note) && fs.readFileSync(note, 'utf8') === wanted) return
  const { empty } = JSON.parse((await command(env, 'migrate', { signal })).at(-1))
  if (empty && demo) await loadDemo(env, dataFolder, { tell, signal })
  if (note && !(empty && !demo)) fs.writeFileSync(note, wanted)
}

const halfDemo = (dataFolder) => path.join(dataFolder, 'demo-loading')

async function loadDemo(env, dataFolder, { tell, signal }) {
  tell('Loading the demonstration laboratory')
  fs.writeFileSync(halfDemo(dataFolder), '')
  await command(env, 'seed-demo', { tell, signal })
  fs.rmSync(halfDemo(dataFolder))
}

/** A demonstration whose loading was interrupted is begun again: nothing real can be in it yet. */
function forgetHalfDemo(dataFolder, tell) {
  if (!fs.existsSync(halfDemo(dataFolder))) return
  tell('The demonstration was loaded only in part; beginning again')
  for (const name of ['objects', 'keys', 'fakes'])
    fs.rmSync(path.join(dataFolder, name), { recursive: true, force: true })
  removeCluster(dataFolder)
  fs.rmSync(halfDemo(dataFolder))
}

/** Runs a command of server/cli.ts and answers its lines; `tell` hears each as it comes. */
function command(env, name, { tell, signal }) {
  const { command: node, args, cwd } = typescript('server/cli.ts', name)
  const child = spawn(node, args, { cwd, env, stdio: ['ignore', 'pipe', 'pipe'], detached: true, signal })
  const lines = []
  createInterface({ input: child.stdout }).on('line', (line) => {
    lines.push(line)
    tell?.(`  ${line}`)
  })
  let complaint = ''
  child.stderr.on('data', (chunk) => {
    complaint = (complaint + chunk).slice(-4000)
  })
  return new Promise((done, fail) => {
    child.once('error', fail)
    child.once('close', (code) =>
      code === 0 ? done(lines) : fail(new Error(`The command ${name} failed.\n${complaint}`)),
    )
  })
}
