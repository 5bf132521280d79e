import type { Services } from '../../../platform/services.ts'
import { appendEvent } from '../../ledger/index.ts'
import { findFile, setFileState } from '../repository.ts'
import { digestInStore } from './receive-file.ts'

/** Reads the store's copy again and compares its digest; a difference is an event of the file's home. */
export async function verifyFile(services: Services, fileId: string): Promise<void> {
  const file = await findFile(services.db, fileId)
  if (file === null) return
  const state =
    (await digestInStore(services, file.objectKey, file.objectVersion)) === file.sha256
      ? 'verified'
      : 'mismatch'
  await services.db.transaction(async (t) => {
    await setFileState(services.db, fileId, state, t)
    if (state === 'verified') return
    services.log.error({ fileId }, 'the store holds other bytes than were uploaded')
    await appendEvent(services, t, {
      actor: { kind: 'system', id: null, onBehalfOf: null },
      action: 'file.mismatch',
      subject:
        file.homeEntryId === null
          ? { kind: 'run', id: file.runId as string }
          : { kind: 'entry', id: file.homeEntryId },
      payload: { fileId },
    })
  })
}
