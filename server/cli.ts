import { readConfig, ConfigError } from './platform/config.ts'
import { openDatabase } from './platform/db/database.ts'
import { migrate } from './platform/db/migrate.ts'
import { openLog } from './platform/logger.ts'

const usage = `usage: node --import tsx server/cli.ts <command>
  migrate    bring the database to the newest form; prints {"empty": true} when it holds no laboratory
  seed-demo  load the demonstration laboratory into an empty database
`

const commands: Record<string, () => Promise<void>> = {
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
}

const [name = ''] = process.argv.slice(2)
const command = commands[name]
if (!command) {
  process.stderr.write(usage)
  process.exit(2)
}
try {
  await command()
} catch (error) {
  console.error(error instanceof ConfigError ? error.message : error)
  process.exit(1)
}
