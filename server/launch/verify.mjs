import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { prepare } from './prepare.mjs'
import { root } from './root.mjs'
import { runMain } from './say.mjs'

/** `npm run verify -- bundle.zip [...]`: packages alone are needed; the rest is server/verify-command.ts. */
await runMain(async () => {
  // Standard output belongs to the report.
  await prepare({ only: 'packages', tell: (line) => process.stderr.write(`${line}\n`) })
  const { register } = await import('tsx/esm/api')
  register()
  const { runVerify } = await import(pathToFileURL(path.join(root, 'server/verify-command.ts')).href)
  // npm runs this in the checkout; paths are meant from where the person is.
  process.chdir(process.env.INIT_CWD ?? process.cwd())
  process.exitCode = await runVerify(process.argv.slice(2))
})
