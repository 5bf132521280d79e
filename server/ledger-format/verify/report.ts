/** One line of the answer; `ok` null: something is missing, nothing false. A remark is true with detail `remark: …`. */
export interface Check {
  name: string
  path: string
  ok: boolean | null
  detail: string
}

export type Verdict = 'holds' | 'broken' | 'incomplete'

/** Something is false. */
export class Wrong extends Error {}

/** Something that the layout allows to be absent is absent. */
export class Missing extends Error {}

export function need(truth: boolean, why: string): asserts truth {
  if (!truth) throw new Wrong(why)
}

/** A value that damaged input may lack. */
export function present<T>(value: T | null | undefined, why: string): T {
  if (value === null || value === undefined) throw new Wrong(why)
  return value
}

/** Collects the checks. Whatever goes wrong inside one fails that check, with its path, and never stops the run. */
export class Report {
  readonly checks: Check[] = []

  add(name: string, path: string, ok: boolean | null, detail = ''): void {
    this.checks.push({ name, path, ok, detail })
  }

  remark(name: string, path: string, detail: string): void {
    this.add(name, path, true, `remark: ${detail}`)
  }

  /** Runs one check; answers what the work answers, or undefined when it failed. */
  check<T>(name: string, path: string, work: () => T): T | undefined {
    try {
      const answer = work()
      this.add(name, path, true)
      return answer
    } catch (error) {
      this.fail(name, path, error)
      return undefined
    }
  }

  fail(name: string, path: string, error: unknown): void {
    const detail = error instanceof Error ? error.message : String(error)
    this.add(name, path, error instanceof Missing ? null : false, detail.slice(0, 300))
  }

  verdict(): Verdict {
    if (this.checks.some((check) => check.ok === false)) return 'broken'
    return this.checks.some((check) => check.ok === null) ? 'incomplete' : 'holds'
  }
}
