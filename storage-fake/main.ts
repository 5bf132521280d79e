import { startStorageFake } from './server.ts'

function need(name: string): string {
  const value = process.env[name]
  if (value) return value
  process.stderr.write(`storage: the environment variable ${name} is not set.\n`)
  process.exit(2)
}

const port = Number(process.env.STORAGE_PORT ?? 0)
if (!Number.isInteger(port) || port < 0 || port > 65_535) {
  process.stderr.write('storage: STORAGE_PORT must be a port number.\n')
  process.exit(2)
}

const storage = await startStorageFake({
  folder: need('STORAGE_FOLDER'),
  port,
  accessKey: need('STORAGE_ACCESS_KEY'),
  secretKey: need('STORAGE_SECRET_KEY'),
  region: process.env.STORAGE_REGION ?? 'us-east-1',
})
process.stdout.write(`storage on ${storage.port}\n`)

const stop = () => void storage.close().then(() => process.exit(0))
process.once('SIGTERM', stop)
process.once('SIGINT', stop)
