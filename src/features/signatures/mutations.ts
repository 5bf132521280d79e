import { useMutation, useQueryClient } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'
import { endorseKey, enrolKey, type CheckedEnrolment } from './enrolment.ts'
import { lifeOfEntryChanged } from './invalidate.ts'
import { signingKeyQuery } from './queries.ts'

/** Back to the author, also while authors still sign (then it is a reopening); voids the signatures given. */
export function useReturnEntry(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (reason: string) => call('returnEntry', { params: { id: entryId }, body: { reason } }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

export function useWithdrawEntry(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (reason: string) => call('withdrawEntry', { params: { id: entryId }, body: { reason } }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

/** A new entry that amends a sealed one. */
export function useCreateAddendum(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (title: string) =>
      call('createAddendum', { params: { id: entryId }, body: title ? { title } : {} }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

export interface Owner {
  id: string
  name: string
}
type Laboratory = { id: string; name: string }
type Progress = (share: number) => void

/** Makes and enrols a key of my own. */
export function useEnrolKey(owner: Owner, laboratory: Laboratory) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: ({ passphrase, onProgress }: { passphrase: string; onProgress: Progress }) =>
      enrolKey(passphrase, owner, laboratory, onProgress),
    onSuccess: (key) => {
      client.setQueryData(signingKeyQuery.queryKey, key)
      return client.invalidateQueries({ queryKey: queryKeys.people })
    },
  })
}

/** Endorses the key of another person with my own. */
export function useEndorseKey(endorser: Owner, laboratory: Laboratory) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (given: {
      passphrase: string
      person: CheckedEnrolment
      identity: string
      onProgress: Progress
    }) => endorseKey(given.passphrase, given.person, given.identity, endorser, laboratory, given.onProgress),
    onSuccess: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: queryKeys.people }),
        client.invalidateQueries({ queryKey: ['ledger', 'events'] }),
      ]),
  })
}

/** Says why writing and work lie more than a day apart; the record holds it. */
export function useLateRemark(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (lateRemark: string) =>
      call('changeEntry', { params: { id: entryId }, body: { lateRemark } }),
    onSuccess: (entry) => client.setQueryData(queryKeys.entry(entryId), entry),
  })
}
