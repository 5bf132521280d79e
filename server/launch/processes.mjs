import { spawn } from 'node:child_process'
import fs from 'node:fs'
import path from 'node:path'

const FIRST_PAUSE_MS = 500
const LONGEST_PAUSE_MS = 30_000
/** A process that lived this long starts again at once the next time. */
const STEADY_MS = 60_000

/**
 * The processes of one product: started detached (so that Ctrl-C reaches this process alone, which then stops them in
 * order), their output in log files, restarted with growing pauses when they die, remembered on disk so that a later
 * start can end what a killed one left behind.
 */
export class Processes {
  #members = []
  #stopping = false
  #folder

  constructor(dataFolder) {
    this.#folder = dataFolder
    fs.mkdirSync(path.join(dataFolder, 'logs'), { recursive: true, mode: 0o700 })
  }

  /**
   * Starts a process and waits until `ready(child)` resolves. Options: `command`, `args`, `env`, `cwd`, `uid`, `gid`,
   * `ready`, `stopSignal` (SIGTERM), `graceMs` after which it is killed, `onDeath(line)` to report a restart.
   */
  async start(name, options) {
    const member = {
      name,
      options,
      child: null,
      pause: FIRST_PAUSE_MS,
      logFile: path.join(this.#folder, 'logs', `${name}.log`),
    }
    this.#members.push(member)
    await this.#launch(member)
  }

  async #launch(member) {
    const { command, args, env, cwd, uid, gid, ready } = member.options
    const log = fs.openSync(member.logFile, 'a')
    const stdio = ready.ipc ? ['ignore', log, log, 'ipc'] : ['ignore', log, log]
    const child = spawn(command, args, { cwd, env, uid, gid, stdio, detached: true })
    fs.closeSync(log)
    member.child = child
    member.startedAt = Date.now()
    this.#remember()
    const died = new Promise((_, fail) => {
      child.once('error', (error) => fail(new Error(`${member.name} cannot start: ${error.message}`)))
      child.once('exit', (code, signal) =>
        fail(new Error(`${member.name} ended at its start (${signal ?? code}).\n${tail(member.logFile)}`)),
      )
    })
    died.catch(() => undefined)
    await Promise.race([ready.wait(child), died])
    child.once('exit', () => this.#restartLater(member))
    if (child.exitCode !== null) this.#restartLater(member)
  }

  #restartLater(member) {
    if (this.#stopping || member.restarting) return
    member.restarting = true
    if (Date.now() - member.startedAt > STEADY_MS) member.pause = FIRST_PAUSE_MS
    member.options.onDeath?.(
      `${member.name} ended unexpectedly and is started again; its log: ${member.logFile}`,
    )
    setTimeout(() => {
      member.restarting = false
      if (this.#stopping) return
      member.pause = Math.min(2 * member.pause, LONGEST_PAUSE_MS)
      this.#launch(member).catch(() => this.#restartLater(member))
    }, member.pause)
  }

  /** Stops all in the reverse of the order in which they started, each before the next. */
  async stop() {
    this.#stopping = true
    for (const { child, options } of this.#members.toReversed()) await end(child, options)
    fs.rmSync(rememberedFile(this.#folder), { force: true })
  }

  #remember() {
    const alive = this.#members
      .filter(({ child }) => child?.pid)
      .map(({ child, options }) => ({
        pid: child.pid,
        since: startTime(child.pid),
        signal: options.stopSignal ?? 'SIGTERM',
      }))
    fs.writeFileSync(rememberedFile(this.#folder), JSON.stringify(alive))
  }
}

/** Ready when the process sends the message 'ready'. */
export const readyByMessage = {
  ipc: true,
  wait: (child) =>
    new Promise((done) => {
      child.on('message', (message) => message === 'ready' && done())
    }),
}

/** Ready when `probe()` resolves to true; asked every 50 ms. */
export function readyWhen(probe) {
  return {
    ipc: false,
    async wait(child) {
      while (child.exitCode === null && !(await probe())) await pause(50)
    },
  }
}

async function end(child, { stopSignal = 'SIGTERM', graceMs = 40_000 }) {
  if (!child || child.exitCode !== null || child.signalCode !== null) return
  const gone = new Promise((done) => child.once('exit', done))
  child.kill(stopSignal)
  const kill = setTimeout(() => child.kill('SIGKILL'), graceMs)
  await gone
  clearTimeout(kill)
}

const rememberedFile = (folder) => path.join(folder, 'processes.json')

/** Ends what an earlier product on this data folder left running when it was killed. */
export async function endLeftovers(dataFolder) {
  const file = rememberedFile(dataFolder)
  if (!fs.existsSync(file)) return
  const left = JSON.parse(fs.readFileSync(file, 'utf8')).toReversed()
  for (const { pid, since, signal } of left) {
    // The start time tells a leftover from a stranger that got its number.
    const lives = () => since !== null && startTime(pid) === since
    if (!lives()) continue
    process.kill(pid, signal)
    for (let i = 0; i < 100 && lives(); i++) await pause(50)
    if (lives()) process.kill(pid, 'SIGKILL')
  }
  fs.rmSync(file, { force: true })
}

/** Start time of a process in clock ticks since boot (proc(5), field 22 of stat), or null when there is none. */
export function startTime(pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8')
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return fields[0] === 'Z' ? null : fields[19]
  } catch {
    return null
  }
}

function tail(file) {
  return fs.readFileSync(file, 'utf8').trim().split('\n').slice(-15).join('\n')
}

export function pause(milliseconds) {
  return new Promise((done) => setTimeout(done, milliseconds))
}
