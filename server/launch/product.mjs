import { execFile } from 'node:child_process'
import { promisify } from 'node:util'
import { startCluster } from './cluster.mjs'
import { isDemo, productEnvironment, standIns, workerEnvironment } from './configuration.mjs'
import { lockDataFolder, openDataFolder, secretsOf } from './data-folder.mjs'
import { isFree } from './ports.mjs'
import { endLeftovers, pause, Processes, readyByMessage } from './processes.mjs'
import { Refusal } from './say.mjs'
import { typescript, startStandIns } from './services.mjs'

/**
 * Starts database and stand-ins on a data folder and brings the database up to date.
 * @param given `dataFolder`, `port`, `environment`, `fast` (tests: a database without safety against power cuts), `tell` (line of progress)
 * @returns `{ url, env, workerEnv, ports, processes, stop }`
 */
export async function startServices({ dataFolder: folder, port, environment = process.env, fast = false, tell }) {
  const dataFolder = openDataFolder(folder)
  const release = lockDataFolder(dataFolder)
  const processes = new Processes(dataFolder)
  const stop = async () => {
    await processes.stop()
    release()
  }
  try {
    await endLeftovers(dataFolder)
    if (!(await isFree(port))) throw new Refusal(`Port ${port} is in use. Take another one: PORT=${port + 1} npm start`)
    const secrets = secretsOf(dataFolder)
    tell('Starting database, object store, mail and sign-in')
    const [database, ports] = await Promise.all([
      standIns(environment).includes('database') && startCluster(processes, dataFolder, secrets, { fast, onDeath: tell }),
      startStandIns(processes, { environment, dataFolder, secrets, onDeath: tell }),
    ])
    const demo = isDemo(environment)
    const env = productEnvironment({ environment, port, dataFolder, secrets, database, ports, demo })
    const { empty } = JSON.parse(await command(env, 'migrate'))
    if (empty && demo && !process.env.NOSEED) {
      tell('Loading the demonstration laboratory')
      await command(env, 'seed-demo')
    }
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

async function command(env, name) {
  const { command: node, args, cwd } = typescript('server/cli.ts', name)
  const { stdout } = await promisify(execFile)(node, args, { cwd, env, maxBuffer: 1 << 26 })
  return stdout.trim().split('\n').at(-1)
}
