import { spawnSync } from 'node:child_process'
import fs from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { prepare } from './prepare.mjs'
import { root } from './root.mjs'
import { runMain, say } from './say.mjs'

const projects = ['unit', 'http', 'e2e']

/**
 * `npm test`: sets everything up, then lint, types and all tests. Arguments go to vitest and run a part alone, for example
 * `npm test -- tests/physics` or `npm test -- --project unit`. The last line says how many passed and failed.
 */
await runMain(async () => {
  await prepare()
  const given = process.argv.slice(2)
  const checks = given.length === 0 ? [runCheck('lint'), runCheck('typecheck')] : []
  const results = given.includes('--project')
    ? [runTests(given)]
    : projects.map((name) => runTests(['--project', name, ...given]))
  const passed = sum([...checks, ...results], 'passed')
  const failed = sum([...checks, ...results], 'failed')
  say(`${passed} passed, ${failed} failed`)
  process.exitCode = failed === 0 && passed > 0 ? 0 : 1
})

function sum(results, name) {
  return results.reduce((total, result) => total + result[name], 0)
}

function runCheck(script) {
  say(`Running ${script}`)
  const { status } = spawnSync('npm', ['run', '--silent', script], { cwd: root, stdio: 'inherit' })
  return { passed: status === 0 ? 1 : 0, failed: status === 0 ? 0 : 1 }
}

/** Runs vitest and counts by its own report; a run that breaks before any test counts as one failure. */
function runTests(args) {
  say(`Running the tests: ${args.join(' ')}`)
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'halfsilver-report-'))
  const report = path.join(folder, 'report.json')
  const vitest = path.join(root, 'node_modules/vitest/vitest.mjs')
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`]
  const run = spawnSync(process.execPath, [vitest, 'run', '--passWithNoTests', ...reporters, ...args], {
    cwd: root,
    stdio: 'inherit',
  })
  const counted = readReport(report)
  fs.rmSync(folder, { recursive: true, force: true })
  // A file that cannot be loaded, or an error outside of any test, fails the run without a failed test.
  return run.status !== 0 && counted.failed === 0 ? { ...counted, failed: 1 } : counted
}

function readReport(file) {
  if (!fs.existsSync(file)) return { passed: 0, failed: 0 }
  const { numPassedTests, numFailedTests } = JSON.parse(fs.readFileSync(file, 'utf8'))
  return { passed: numPassedTests, failed: numFailedTests }
}
