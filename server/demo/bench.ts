import type { Experiment } from '../contract/common.ts'
import type { Meaning } from '../contract/signatures.ts'
import type { Condition } from '../contract/runs.ts'
import { openComputePool, runCalculation, startCalculation, type ComputePool } from '../features/calculations/index.ts'
import { createEntry, saveContent } from '../features/entries/index.ts'
import { openReadingPool, readFile, storeFile, type ReadingPool } from '../features/files/index.ts'
import { createNotebook, setMember } from '../features/notebooks/index.ts'
import { createRunInEntry, findRun } from '../features/runs/index.ts'
import { prepareRecord, returnEntry, signEntry, withdrawEntry, createAddendum } from '../features/signatures/index.ts'
import { renderEvidence } from '../features/evidence/index.ts'
import type { Actor } from '../platform/http/actor.ts'
import type { SettableClock } from '../platform/clock.ts'
import type { Services } from '../platform/services.ts'
import { requireWritableEntry } from '../features/entries/index.ts'
import type { DemoSigner } from './signer.ts'

export interface DemoPerson {
  actor: Actor
  signer: DemoSigner
}

/** The demonstration's people at work: every act goes through the product's own use cases, under the injected clock. */
export class DemoBench {
  readonly services: Services
  readonly clock: SettableClock
  readonly #reading: ReadingPool = openReadingPool()
  readonly #computing: ComputePool = openComputePool()

  constructor(services: Services, clock: SettableClock) {
    this.services = services
    this.clock = clock
  }

  close(): Promise<unknown> {
    return Promise.all([this.#reading.close(), this.#computing.close()])
  }

  /** Some minutes pass. */
  pass(minutes: number): void {
    this.clock.advance(minutes * 60_000)
  }

  async notebook(keeper: DemoPerson, title: string, members: [DemoPerson, Actor['roles'][number]][]): Promise<string> {
    const id = await createNotebook(this.services, keeper.actor, title)
    for (const [member, role] of members) await setMember(this.services, keeper.actor, id, member.actor.personId, role)
    return id
  }

  entry(author: DemoPerson, notebookId: string, title: string, experiment: Experiment): Promise<string> {
    return createEntry(this.services, author.actor, notebookId, { title, experiment, runAt: this.clock.now() })
  }

  async run(
    person: DemoPerson,
    entryId: string,
    run: { experiment: Experiment; seconds: number | null; conditions: [string, string, string | null, string | null][]; apparatus: { id: string; role: string | null; channel: number | null }[] },
  ): Promise<string> {
    const conditions: Condition[] = run.conditions.map(([name, value, u, unit]) => ({ name, value, u, unit }))
    return createRunInEntry(this.services, person.actor, entryId, {
      experiment: run.experiment,
      startedAt: this.clock.now().toISOString(),
      durationPs: run.seconds === null ? null : run.seconds * 1e12,
      conditions,
      apparatus: run.apparatus,
    })
  }

  /** Uploads a record to a run and has it read. */
  async upload(person: DemoPerson, runId: string, name: string, text: string): Promise<string> {
    const { services } = this
    const file = await storeFile(
      services,
      person.actor,
      {
        entryId: null,
        runId,
        claim: async (t) => {
          const run = await findRun(services.db, runId, t)
          if (run === null || run.entryId === null) throw new Error(`run ${runId} is not filed`)
          await requireWritableEntry(services, person.actor, run.entryId, t)
          return { kind: 'entry' as const, id: run.entryId }
        },
      },
      { name, bytes: new TextEncoder().encode(text) },
    )
    await readFile(services, this.#reading, file.id)
    this.pass(1)
    return file.id
  }

  /** Starts a calculation and computes it here, as a worker would. */
  async compute(person: DemoPerson, entryId: string, kind: string, fileId: string, parameters: Record<string, unknown>): Promise<string> {
    const { id } = await startCalculation(this.services, person.actor, entryId, { kind, inputs: [{ fileId }], parameters })
    await runCalculation(this.services, this.#computing, id)
    return id
  }

  async write(person: DemoPerson, entryId: string, content: unknown): Promise<void> {
    await saveContent(this.services, person.actor, entryId, '*', content)
    this.pass(4)
  }

  /** Signs as the person's own device would: the exact bytes, under the key that only the passphrase opens. */
  async sign(person: DemoPerson, entryId: string, meaning: Meaning): Promise<void> {
    const record = await prepareRecord(this.services, person.actor, entryId, { meaning })
    this.pass(1)
    await signEntry(this.services, person.actor, entryId, {
      meaning,
      recordSha256: record.sha256,
      signature: person.signer.sign(record.bytes),
    })
  }

  /** The witness signs; the entry is sealed and its evidence made. */
  async seal(witness: DemoPerson, entryId: string): Promise<void> {
    await this.sign(witness, entryId, 'witness-read')
    this.pass(1)
    await renderEvidence(this.services, entryId)
  }

  async giveBack(witness: DemoPerson, entryId: string, reason: string): Promise<void> {
    await returnEntry(this.services, witness.actor, entryId, reason)
  }

  async withdraw(person: DemoPerson, entryId: string, reason: string): Promise<void> {
    await withdrawEntry(this.services, person.actor, entryId, reason)
  }

  async addendum(person: DemoPerson, entryId: string, title: string): Promise<string> {
    const { id } = await createAddendum(this.services, person.actor, entryId, title)
    return id
  }
}
