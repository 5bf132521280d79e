import { randomUUID } from 'node:crypto'
import type { Transaction } from 'sequelize'
import { Problem } from '../../../contract/problems.ts'
import type { KindDefinition } from '../../../physics/definition.ts'
import { ENGINE_VERSION } from '../../../physics/engine.ts'
import { kindDefinition, parseParameters } from '../../../physics/registry.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { cutRevision, requireOpen, requireEntry, requireWritableEntry } from '../../entries/index.ts'
import { requireFile, waitForReading, type FileRow } from '../../files/index.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { announce } from '../announce.ts'
import { cacheKey } from '../cache-key.ts'
import {
  findCalculation,
  findKnown,
  finish,
  insertCalculation,
  takeNextLabel,
  type CalculationRow,
  type FileInput,
} from '../repository.ts'

/** How long the request waits for a file that was uploaded just now to be read; then the calculation queues behind it. */
const READING_WAIT_MS = 15_000

export interface CalculationStart {
  kind: string
  inputs: ({ fileId: string } | { calculationId: string; pointer: string })[]
  parameters: Record<string, unknown>
}

export interface Started {
  id: string
  /** The answer was known already. */
  known: boolean
}

/** Starts a calculation, or answers at once when the same was computed before. */
export async function startCalculation(
  services: Services,
  actor: Actor,
  entryId: string,
  start: CalculationStart,
): Promise<Started> {
  requireOpen(await requireEntry(services, actor, entryId, 'write'))
  const definition = kindDefinition(start.kind)
  const parameters = parseParameters(definition, start.parameters)
  const inputs = await resolveInputs(services, actor, definition, start.inputs)
  return add(services, actor, entryId, definition, parameters, inputs, null)
}

/**
 * Computes an existing calculation again with other parameters. What was computed never changes: the answer is a new
 * calculation with the same label, which takes its place in the text.
 */
export async function startSuccessor(
  services: Services,
  actor: Actor,
  previous: CalculationRow,
  changed: Record<string, unknown>,
): Promise<Started> {
  requireOpen(await requireEntry(services, actor, previous.entryId, 'write'))
  const definition = kindDefinition(previous.kind)
  const parameters = parseParameters(definition, changed)
  const inputs = await resolveInputs(
    services,
    actor,
    definition,
    previous.inputs.map(({ fileId }) => ({ fileId })),
  )
  return add(services, actor, previous.entryId, definition, parameters, inputs, previous)
}

async function resolveInputs(
  services: Services,
  actor: Actor,
  definition: KindDefinition,
  given: CalculationStart['inputs'],
): Promise<FileInput[]> {
  const { min, max } = definition.inputs
  if (given.length < min || given.length > max)
    throw invalid(
      '/inputs',
      `${definition.title} takes ${min === max ? min : `${min} to ${max}`} input${max === 1 ? '' : 's'}, not ${given.length}.`,
    )
  return Promise.all(
    given.map(async (input, index) => {
      if (!('fileId' in input))
        throw invalid(`/inputs/${index}`, `${definition.title} takes files, not other calculations.`)
      await requireFile(services, actor, input.fileId)
      const file = await waitForReading(services, input.fileId, READING_WAIT_MS)
      requireUsable(file, definition, index)
      return { fileId: file.id, sha256: file.sha256, readingSha256: file.readingSha256 }
    }),
  )
}

function requireUsable(file: FileRow, definition: KindDefinition, index: number): void {
  if (file.readingStatus === 'unreadable')
    throw new Problem(
      'unreadable-file',
      `${file.name} cannot be read: ${file.readingDetail ?? 'its form is not known.'} The file is safe; say how to read it and compute again.`,
      {
        errors: [{ pointer: `/inputs/${index}/fileId`, detail: 'cannot be read' }],
      },
    )
  const kind = file.readingSummary?.kind
  if (kind && !(definition.inputs.accepts as string[]).includes(kind))
    throw invalid(
      `/inputs/${index}/fileId`,
      `${file.name} holds a ${kind === 'tags' ? 'tag record' : kind}; ${definition.title} takes ${definition.inputs.accepts.join(' or ')}.`,
    )
}

async function add(
  services: Services,
  actor: Actor,
  entryId: string,
  definition: KindDefinition,
  parameters: Record<string, unknown>,
  inputs: FileInput[],
  previous: CalculationRow | null,
): Promise<Started> {
  const { kind, version } = definition
  const key = cacheKey({ kind, version, engine: ENGINE_VERSION, parameters, inputs })
  const id = randomUUID()
  return services.db.transaction(async (t) => {
    const entry = await requireWritableEntry(services, actor, entryId, t)
    await cutRevision(services, t, entry, 'calculation')
    await insertCalculation(
      services.db,
      {
        id,
        entryId,
        label: previous?.label ?? (await takeNextLabel(services.db, entryId, t)),
        kind,
        version,
        engine: ENGINE_VERSION,
        parameters,
        inputs,
        cacheKey: key,
        supersedes: previous?.id ?? null,
        createdBy: actor.personId,
        tokenId: actor.tokenId ?? null,
        createdAt: services.clock.now(),
      },
      t,
    )
    const known = key === null ? null : await findKnown(services.db, key, t)
    if (known === null)
      await services.queue.send('calculate', { calculationId: id }, { transaction: t, retryLimit: 3 })
    else await finishWithKnown(services, actor, id, known, t)
    return { id, known: known !== null }
  })
}

async function finishWithKnown(
  services: Services,
  actor: Actor,
  id: string,
  known: CalculationRow,
  t: Transaction,
): Promise<void> {
  const calculation = await findCalculation(services.db, id, t)
  if (calculation === null || known.resultSha256 === null || known.cacheKey === null)
    throw new Error('a known result is incomplete')
  const now = services.clock.now()
  await finish(
    services.db,
    id,
    {
      inputs: calculation.inputs,
      cacheKey: known.cacheKey,
      resultSha256: known.resultSha256,
      figures: known.figures,
      notes: known.notes,
      worker: known.worker ?? 'unknown',
      startedAt: now,
      finishedAt: now,
    },
    t,
  )
  await announce(services, id, t)
  await appendEvent(services, t, {
    actor: actorOf(actor),
    action: 'calculation.finished',
    subject: { kind: 'entry', id: calculation.entryId },
    payload: {
      calculationId: id,
      kind: calculation.kind,
      version: calculation.version,
      engine: calculation.engine,
      resultSha256: known.resultSha256,
    },
  })
}

function invalid(pointer: string, detail: string): Problem {
  return new Problem('invalid-values', detail, { errors: [{ pointer, detail }] })
}
