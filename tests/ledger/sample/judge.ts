import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'

/** The independent checker of bundles, where it lies beside the checkout; null elsewhere. */
const judge = resolve(import.meta.dirname, '../../../../shared/accept/judge.py')

const python = ['/usr/bin/python3', 'python3'].find(
  (command) => spawnSync(command, ['-c', 'import cryptography']).status === 0,
)

export const judgeIsThere = existsSync(judge) && python !== undefined

export interface JudgeAnswer {
  status: number | null
  verdict: string
  checks: { name: string; path: string; ok: boolean | null; detail: string }[]
}

/** Runs the judge over a bundle; `files` are further options, for example `{ '--anchors': bytes }`. */
export function askJudge(zip: Uint8Array, files: Record<string, Uint8Array> = {}): JudgeAnswer {
  const folder = mkdtempSync(join(tmpdir(), 'judge-'))
  try {
    const path = join(folder, 'bundle.zip')
    writeFileSync(path, zip)
    const options = Object.entries(files).flatMap(([option, bytes]) => {
      writeFileSync(join(folder, option), bytes)
      return [option, join(folder, option)]
    })
    const answer = spawnSync(python ?? '', [judge, path, ...options, '--json'], {
      encoding: 'utf8',
      maxBuffer: 1 << 26,
    })
    const { verdict, checks } = JSON.parse(answer.stdout) as JudgeAnswer
    return { status: answer.status, verdict, checks }
  } finally {
    rmSync(folder, { recursive: true })
  }
}
