import { spawn } from 'node:child_process'
import path from 'node:path'
import { prepare } from './prepare.mjs'
import { root } from './root.mjs'
import { runMain, say } from './say.mjs'

const loader = new URL('./typescript.mjs', import.meta.url).href

/**
 * `npm run dev`: the services of `npm start`, the API and the worker restarted when their files change, and the Vite server
 * with hot reload in front (PORT, default 4310), which hands calls on to the API.
 */
await runMain(async () => {
  await prepare()
  const [{ startServices }, { freePort }] = await Promise.all([
    import('./product.mjs'),
    import('./ports.mjs'),
  ])
  const port = Number(process.env.PORT ?? 4310)
  const dataFolder = path.resolve(root, process.env.HALFSILVER_DATA ?? '.data')
  const { env, workerEnv, ports, stop } = await startServices({
    dataFolder,
    port,
    environment: process.env,
    tell: say,
  })
  const apiPort = await freePort()
  // The product's address is the page's, the API listens elsewhere.
  const api = { ...env, PORT: String(apiPort) }
  const watched = (file, own) =>
    run(
      process.execPath,
      [
        path.join(root, 'node_modules/tsx/dist/cli.mjs'),
        'watch',
        '--clear-screen=false',
        '--import',
        loader,
        file,
      ],
      own,
    )
  const vite = [path.join(root, 'node_modules/vite/bin/vite.js'), '--port', String(port), '--strictPort']
  const children = [
    watched('server/main.ts', api),
    watched('server/worker.ts', workerEnv),
    run(process.execPath, vite, { ...process.env, API_URL: `http://127.0.0.1:${apiPort}` }),
  ]
  say(`Mail goes to http://127.0.0.1:${ports.inbox}; logs are in ${path.join(dataFolder, 'logs')}`)
  let stopping = false
  const end = async () => {
    if (stopping) return
    stopping = true
    await Promise.all(children.map(ended))
    await stop()
    process.exit(0)
  }
  process.on('SIGINT', end)
  process.on('SIGTERM', end)
  for (const child of children) child.on('exit', end)
})

function run(command, args, env) {
  return spawn(command, args, { cwd: root, env, stdio: 'inherit', detached: true })
}

/** Ends a child with everything it started. */
function ended(child) {
  if (child.exitCode !== null || child.signalCode !== null) return undefined
  const gone = new Promise((done) => child.once('exit', done))
  process.kill(-child.pid, 'SIGTERM')
  return gone
}
