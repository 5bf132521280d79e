import { createHash, randomUUID } from 'node:crypto'
import type { Request, Response } from 'express'
import type { Transaction } from 'sequelize'
import { Problem } from '../../../contract/problems.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { readDeclared, requireAsDeclared } from '../declared.ts'
import { receiveStream, type Received } from '../receive-stream.ts'
import { findFile, insertFile, type FileRow } from '../repository.ts'

/** Up to this size the store's copy is read again inside the request; above, a job does it (rulings 29). */
const REREAD_AT_ONCE_BYTES = 64 * 1024 * 1024

/** Where an upload goes. `claim` checks, inside the transaction, that it may still go there, and names the event's subject. */
export interface UploadTarget {
  entryId: string | null
  runId: string | null
  claim(t: Transaction): Promise<{ kind: 'entry' | 'run'; id: string }>
}

/** Takes in a raw file from a request: streamed to the store, compared with what was announced, then kept. */
export async function receiveFile(
  services: Services,
  actor: Actor,
  target: UploadTarget,
  http: { req: Request; res: Response; header: (name: string) => string | undefined },
): Promise<FileRow> {
  const declared = readDeclared(http.header)
  const received = await receiveStream(services.storage, services.config.maxUploadBytes, http.req, http.res)
  return keepFile(services, actor, target, received, () => requireAsDeclared(received, declared))
}

/** Takes in a raw file that this program has at hand. */
export async function storeFile(
  services: Services,
  actor: Actor,
  target: UploadTarget,
  file: { name: string; bytes: Uint8Array },
): Promise<FileRow> {
  const fileId = randomUUID()
  const objectKey = `raw/${fileId}`
  const stored = await services.storage.putBytes(objectKey, file.bytes)
  const { versionId, size, sha256, sha512 } = stored
  return keepFile(
    services,
    actor,
    target,
    { fileId, name: file.name, objectKey, objectVersion: versionId, size, sha256, sha512 },
    () => undefined,
  )
}

/** Compares with a re-read of the store and records the file; what cannot be kept is removed from the store again. */
async function keepFile(
  services: Services,
  actor: Actor,
  target: UploadTarget,
  received: Received,
  check: () => void,
): Promise<FileRow> {
  try {
    check()
    const verified = received.size <= REREAD_AT_ONCE_BYTES
    if (verified) await requireSameInStore(services, received)
    return await recordFile(services, actor, target, received, verified)
  } catch (error) {
    await services.storage.remove(received.objectKey, received.objectVersion)
    throw error
  }
}

async function recordFile(
  services: Services,
  actor: Actor,
  target: UploadTarget,
  received: Received,
  verified: boolean,
): Promise<FileRow> {
  return services.db.transaction(async (t) => {
    const subject = await target.claim(t)
    await insertFile(
      services.db,
      {
        id: received.fileId,
        entryId: target.entryId,
        runId: target.runId,
        name: received.name,
        size: received.size,
        sha256: received.sha256,
        sha512: received.sha512,
        objectKey: received.objectKey,
        objectVersion: received.objectVersion,
        state: verified ? 'verified' : 'stored',
        uploadedBy: actor.personId,
        via: actor.kind === 'token' ? 'token' : 'browser',
        uploadedAt: services.clock.now(),
      },
      t,
    )
    await services.queue.send('read-file', { fileId: received.fileId }, { transaction: t })
    if (!verified) await services.queue.send('verify-file', { fileId: received.fileId }, { transaction: t })
    const file = await findFile(services.db, received.fileId, t)
    if (file === null) throw new Error('the file just recorded is not there')
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'file.stored',
      subject,
      payload: { fileId: received.fileId, sha256: received.sha256, size: String(received.size) },
    })
    return file
  })
}

async function requireSameInStore(services: Services, received: Received): Promise<void> {
  if ((await digestInStore(services, received.objectKey, received.objectVersion)) === received.sha256) return
  throw new Problem(
    'service-unavailable',
    'The object store gave back other bytes than it was given. Nothing was kept; tell the laboratory manager.',
  )
}

/** SHA-256 of the store's own copy, read again from beginning to end. */
export async function digestInStore(
  services: Services,
  key: string,
  version: string | null,
): Promise<string> {
  const hash = createHash('sha256')
  for await (const chunk of await services.storage.get(key, version ?? undefined))
    hash.update(chunk as Buffer)
  return hash.digest('hex')
}
