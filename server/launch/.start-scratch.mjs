import path from 'node:path'
import { root } from './root.mjs'
import { runMain, say } from './say.mjs'

/** `npm start`: set-up, services, product, and one line when it can be used. Ctrl-C stops everything in order. */
await runMain(async () => {
  const { startProduct } = await import('./product.mjs')
  const port = Number(process.env.PORT ?? 4310)
  const dataFolder = path.resolve(root, process.env.HALFSILVER_DATA ?? '.data')
  const giveUp = new AbortController()
  let product = null
  let stopping = false
  const stop = async () => {
    if (stopping) return
    stopping = true
    say('Stopping')
    giveUp.abort()
    await product?.stop()
    if (product) process.exit(0)
  }
  process.on('SIGINT', stop)
  process.on('SIGTERM', stop)
  const environment = { ...process.env, NODE_ENV: process.env.NODE_ENV ?? 'production' }
  try {
    product = await startProduct({ dataFolder, port, environment, tell: say, signal: giveUp.signal })
  } catch (error) {
    if (!stopping) throw error
    return
  }
  say(`Mail goes to http://127.0.0.1:${product.ports.inbox}`)
  say(`Halfsilver is ready at ${product.url}`)
})
