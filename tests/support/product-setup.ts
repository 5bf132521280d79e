import { chmodSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { TestProject } from 'vitest/node'
import { freePort } from '../../server/launch/ports.mjs'
import { prepare } from '../../server/launch/prepare.mjs'
import { startProduct } from '../../server/launch/product.mjs'

declare module 'vitest' {
  interface ProvidedContext {
    /** Origin of the running product. */
    url: string
    dataFolder: string
    ownerDatabaseUrl: string
    /** The environment of the product's API process, from which a test can open services of its own. */
    environment: Record<string, string>
    /** Origin of the page that shows all mail. */
    inboxUrl: string
  }
}

/** One running product with the demonstration laboratory, for all tests of a project. */
export default async function setup(project: TestProject) {
  await prepare()
  const dataFolder = mkdtempSync(path.join(tmpdir(), 'halfsilver-test-'))
  chmodSync(dataFolder, 0o711)
  const environment = { ...ownEnvironment(), NODE_ENV: 'test', LOG_LEVEL: process.env.LOG_LEVEL ?? 'info' }
  const tell = (line: string) => process.stdout.write(`${line}\n`)
  const product = await startProduct({ dataFolder, port: await freePort(), environment, fast: true, tell })
  project.provide('url', product.url)
  project.provide('dataFolder', dataFolder)
  project.provide('ownerDatabaseUrl', product.env.DATABASE_OWNER_URL ?? '')
  project.provide('environment', product.env)
  project.provide('inboxUrl', `http://127.0.0.1:${product.ports.inbox}`)
  return async () => {
    await product.stop()
    rmSync(dataFolder, { recursive: true, force: true })
  }
}

/** Without what vitest adds for itself and without settings of a product that may run beside. */
function ownEnvironment() {
  const foreign =
    /^(VITEST|TEST$|VITE_|PORT$|PUBLIC_ORIGIN$|HALFSILVER_DATA$|DATABASE_|STORAGE_|OAUTH_|SMTP_|TSA_)/
  return Object.fromEntries(Object.entries(process.env).filter(([name]) => !foreign.test(name)))
}
