import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import type { Entry } from '../../../server/contract/entries.ts'
import type { EntrySignature, Meaning, SigningKey } from '../../../server/contract/signatures.ts'
import type { SignedRecord } from '../../../server/ledger-format/record.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'
import { lifeOfEntryChanged } from './invalidate.ts'
import { checkRecord, RecordMismatch } from './record-check.ts'
import { fetchRecord, signRecord, type PreparedRecord, type Presence } from './signing.ts'

/** The server keeps prepared bytes for 15 minutes; a little before that they are fetched anew. */
const freshForMs = 14 * 60_000

export interface SigningSubject {
  entryId: string
  meaning: Meaning
  presence?: Presence
  /** The text as it stands on the screen, saved before it is signed. */
  shownContent: () => unknown
  /** Saves what is not saved yet. */
  save?: () => Promise<void>
  me: { id: string; name: string }
  laboratoryId: string
}

export type Preparation =
  | { state: 'blocked'; entry: Entry }
  | { state: 'no-key'; key: SigningKey }
  | { state: 'ready'; entry: Entry; prepared: PreparedRecord; record: SignedRecord; at: number }

/** Reads the entry and the key anew, fetches the bytes to sign and checks that they say what the screen shows. */
async function prepare({
  entryId,
  meaning,
  presence,
  shownContent,
  save,
  me,
  laboratoryId,
}: SigningSubject): Promise<Preparation> {
  await save?.()
  const entry = await call('getEntry', { params: { id: entryId } })
  if (entry.blocks.length > 0) return { state: 'blocked', entry }
  const key = await call('getSigningKey', {})
  if (key.status !== 'active' && key.status !== 'locked') return { state: 'no-key', key }
  const prepared = await fetchRecord(entryId, meaning, presence)
  const expected = {
    entry,
    content: shownContent(),
    laboratory: { id: laboratoryId },
    meaning,
    signer: me,
    key,
    presence,
  }
  return { state: 'ready', entry, prepared, record: checkRecord(prepared.bytes, expected), at: Date.now() }
}

/**
 * Signing in two steps: the bytes are prepared, checked and shown; then the passphrase signs exactly these. `open` begins
 * the first step, each opening anew.
 */
export function useSigning(
  subject: SigningSubject,
  open: boolean,
  onSigned: (signature: EntrySignature) => void,
) {
  const client = useQueryClient()
  const { entryId, meaning, presence } = subject
  const preparation = useQuery({
    queryKey: ['signing-record', entryId, meaning, presence ?? null] as const,
    queryFn: async () => {
      const prepared = await prepare(subject)
      if ('entry' in prepared) client.setQueryData(queryKeys.entry(entryId), prepared.entry)
      return prepared
    },
    enabled: open,
    retry: false,
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 0,
    refetchOnWindowFocus: false,
  })
  const signing = useMutation({
    mutationFn: async ({
      passphrase,
      onProgress,
    }: {
      passphrase: string
      onProgress: (share: number) => void
    }) => {
      const ready = preparation.data
      if (ready?.state !== 'ready') throw new Error('The bytes to sign are not here yet.')
      const current = Date.now() - ready.at < freshForMs ? ready : await renewed(subject, ready.record)
      return signRecord(entryId, meaning, current.prepared, passphrase, onProgress)
    },
    onSuccess: async (signature) => {
      onSigned(signature)
      await lifeOfEntryChanged(client)
    },
    onSettled: () => client.invalidateQueries({ queryKey: ['signing-key'] }),
  })
  return { preparation, signing }
}

/** The bytes anew, after a long read: the person has read the old ones, so that what they say must be the same. */
async function renewed(subject: SigningSubject, read: SignedRecord) {
  const again = await prepare(subject)
  if (again.state !== 'ready' || again.record.bodySha256 !== read.bodySha256)
    throw new RecordMismatch('The sheet has changed since you opened this.')
  return again
}
