import { spawn } from 'node:child_process'
import fs from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { pathDigest } from './data-folder.mjs'
import { postgresBinaries } from './cluster.mjs'
import { digestOf } from './digest.mjs'
import { pause, startTime } from './processes.mjs'
import { root } from './root.mjs'
import { Refusal, say } from './say.mjs'

const at = (...parts) => path.join(root, ...parts)

/**
 * Everything a fresh clone lacks: npm packages, Debian packages, the built client. Does only what is missing, so that a
 * second run takes no time. `only: 'packages'` stops after the npm packages; `tell` hears each step.
 */
export async function prepare({ only, tell = say } = {}) {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 19))
    throw new Refusal(`Node 20.19 or newer is needed; this is ${process.version}.`)
  const release = await lock(tell)
  try {
    await installPackages(tell)
    if (only === 'packages') return
    await installDebianPackages(tell)
    await build(tell)
  } finally {
    release()
  }
}

/** Two commands in one checkout take turns at the set-up. */
async function lock(tell) {
  const file = path.join(os.tmpdir(), `halfsilver-setup-${process.getuid()}-${pathDigest(root)}`)
  const own = JSON.stringify({ pid: process.pid, since: startTime(process.pid) })
  for (let told = false; ;) {
    try {
      fs.writeFileSync(file, own, { flag: 'wx' })
      return () => fs.rmSync(file, { force: true })
    } catch (error) {
      if (error.code !== 'EEXIST') throw error
    }
    if (!holderLives(file)) fs.rmSync(file, { force: true })
    else if (!told) {
      tell('Another command is setting up this checkout; waiting for it')
      told = true
    }
    await pause(200)
  }
}

function holderLives(file) {
  try {
    const { pid, since } = JSON.parse(fs.readFileSync(file, 'utf8'))
    return since !== null && startTime(pid) === since
  } catch {
    return false
  }
}

async function installPackages(tell) {
  const stamp = at('node_modules/.halfsilver')
  const wanted = digestOf(['package-lock.json'])
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted) return
  if (!fs.existsSync(stamp) && installedFits()) {
    fs.writeFileSync(stamp, wanted)
    return
  }
  tell('Installing npm packages')
  // A production environment would leave out the packages that build and test.
  const { NODE_ENV: _, ...env } = process.env
  await run('npm', ['ci', '--ignore-scripts', '--no-audit', '--no-fund', '--include=dev'], env)
  fs.writeFileSync(stamp, wanted)
}

/** True when node_modules was filled by hand with exactly what the lock file names (packages of other platforms aside). */
function installedFits() {
  const file = at('node_modules/.package-lock.json')
  if (!fs.existsSync(file)) return false
  const installed = JSON.parse(fs.readFileSync(file, 'utf8')).packages
  const locked = JSON.parse(fs.readFileSync(at('package-lock.json'), 'utf8')).packages
  return Object.entries(locked).every(
    ([name, { version, optional }]) =>
      name === '' || (installed[name] ? installed[name].version === version : optional),
  )
}

async function installDebianPackages(tell) {
  const missing = [...(postgresBinaries() ? [] : ['postgresql']), ...(chromium() ? [] : ['chromium'])]
  if (missing.length === 0) return
  const line = `apt-get install -y ${missing.join(' ')}`
  if (process.getuid() !== 0)
    throw new Refusal(
      `The Debian packages ${missing.join(' and ')} are missing. Install them first: sudo ${line}`,
    )
  if (!fs.existsSync('/usr/bin/apt-get'))
    throw new Refusal(
      `${missing.join(' and ')} are missing, and this is not a Debian system. Install them first.`,
    )
  tell(`Installing Debian packages: ${missing.join(', ')}`)
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  await run('apt-get', ['update', '-q'], env)
  await run('apt-get', ['install', '-y', '-q', '--no-install-recommends', ...missing], env)
}

/** The browser that prints sheets and runs the browser tests. */
export function chromium() {
  return ['/usr/bin/chromium', '/usr/bin/chromium-browser'].find((file) => fs.existsSync(file)) ?? null
}

/** What the built client and the offline checker are made from. */
const sources = [
  'src',
  'public',
  'server/contract',
  'server/document',
  'server/ledger-format',
  'index.html',
  'package-lock.json',
  'tsconfig.json',
]

async function build(tell) {
  const configs = ['vite.config.ts', 'vite.checker.config.ts']
  const wanted = digestOf([...sources, ...configs])
  const stamp = at('dist/built-from')
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted) return
  tell('Building the client')
  const { NODE_ENV: _, ...env } = process.env
  for (const config of configs)
    await run(
      process.execPath,
      [at('node_modules/vite/bin/vite.js'), 'build', '--config', at(config), '--logLevel', 'warn'],
      { ...env, NO_COLOR: '1' },
    )
  fs.writeFileSync(stamp, wanted)
}

/** Runs a command; its output is shown only when it fails. */
function run(command, args, env) {
  return new Promise((done, fail) => {
    const child = spawn(command, args, { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] })
    let output = ''
    const keep = (chunk) => {
      output = (output + chunk).slice(-8000)
    }
    child.stdout.on('data', keep)
    child.stderr.on('data', keep)
    child.once('error', fail)
    child.once('exit', (code) => {
      if (code === 0) done()
      else fail(new Refusal(`${command} ${args.slice(0, 2).join(' ')} failed:\n${output}`))
    })
  })
}
