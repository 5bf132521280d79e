import { closePrinter } from './features/evidence/index.ts'
import { readConfig } from './platform/config.ts'
import { openDatabase } from './platform/db/database.ts'
import { migrate } from './platform/db/migrate.ts'
import { openLog } from './platform/logger.ts'
import { openServices } from './platform/open-services.ts'
import { complain } from './platform/run-process.ts'
import type { Services } from './platform/services.ts'

const usage = `usage: node --import ./server/launch/typescript.mjs server/cli.ts <command>
  migrate    bring the database to the newest form; prints {"empty": true} when it holds no laboratory
  seed-demo  load the demonstration laboratory into an empty database
  open-laboratory <account id> <login> <full name> <e-mail>
             open the laboratory of an empty database with its first manager, who signs in with that account
`

const commands: Record<string, (given: string[]) => Promise<void>> = {
  async migrate() {
    const { database } = readConfig(process.env, 'cli')
    const log = openLog('migrate')
    const owner = database.owner ?? ''
    const done = await migrate(owner, log)
    const db = openDatabase(owner, log, 1)
    const laboratory = await db.row('select id, demo from record.laboratory')
    await db.close()
    process.stdout.write(`${JSON.stringify({ migrated: done, empty: laboratory === null })}\n`)
  },
  // Loaded only when asked for: every start migrates, few do more.
  async 'seed-demo'() {
    const { seedDemo } = await import('./demo/seed-demo.ts')
    await withServices(async (services) => {
      if (!services.config.demo)
        throw new Error(
          'HALFSILVER_DEMO is not set: the demonstration is loaded only where nothing real is configured.',
        )
      await seedDemo(services, (step) => process.stdout.write(`${step}\n`))
    })
  },
  async 'open-laboratory'([accountId = '', login = '', name = '', email = '']) {
    if (!/^\d+$/.test(accountId) || !login || !name || !email) throw new Error(usage)
    const { openLaboratory } = await import('./features/laboratory/index.ts')
    const { addPerson } = await import('./features/people/index.ts')
    const { identityProvider } = await import('./platform/identity/sign-in.ts')
    await withServices(async (services) => {
      await openLaboratory(services, { name: services.config.laboratory.name, demo: false })
      await addPerson(services, {
        login,
        name,
        email,
        provider: identityProvider,
        providerAccountId: accountId,
        roles: ['manager'],
      })
    })
  },
}

async function withServices(work: (services: Services) => Promise<void>) {
  const config = readConfig(process.env, 'cli')
  const { services, close } = await openServices(config, config.database.app, openLog('cli', process.stderr))
  try {
    await services.storage.ensureBucket()
    await work(services)
  } finally {
    await close()
    await closePrinter()
  }
}

const [name = '', ...given] = process.argv.slice(2)
const command = commands[name]
if (!command) {
  process.stderr.write(usage)
  process.exit(2)
}
try {
  await command(given)
} catch (error) {
  complain(error)
  process.exit(1)
}
