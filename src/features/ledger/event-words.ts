import type { LedgerEventView } from '../../../server/contract/ledger.ts'

/** What an event is called on screen; actions that are not here are shown by their own name. */
const words: Record<string, string> = {
  'laboratory.opened': 'Laboratory opened',
  'key.root-enrolled': 'First key enrolled',
  'key.enrolled': 'Key enrolled',
  'key.endorsed': 'Key endorsed',
  'key.certified': 'Key certified',
  'key.revoked': 'Key revoked',
  'entry.created': 'Created',
  'entry.revised': 'Revised',
  'entry.changed': 'Changed',
  'entry.run-filed': 'Run filed',
  'file.stored': 'File stored',
  'file.mismatch': 'File does not match',
  'reading.set': 'Reading set',
  'calculation.finished': 'Calculated',
  'calculation.cancelled': 'Calculation stopped',
  'entry.sealed': 'Sealed',
  'entry.reopened': 'Reopened',
  'entry.returned': 'Returned',
  'entry.withdrawn': 'Withdrawn',
  'entry.author-excepted': 'Author excepted',
  'entry.rendered': 'Printed',
  'entry.amended': 'Amended',
  'entry.exported': 'Exported',
  'notebook.exported': 'Exported',
  'notebook.created': 'Notebook created',
  'notebook.renamed': 'Notebook renamed',
  'notebook.member-set': 'Member set',
  'notebook.member-removed': 'Member removed',
  'person.added': 'Person added',
  'person.signed-in': 'Signed in',
  'person.signed-out': 'Signed out',
  'token.created': 'Token made',
  'token.ended': 'Token ended',
  'signing.unlocked': 'Key unlocked',
  'signing.refused': 'Passphrase refused',
  'signing.locked': 'Signing locked',
  'run.created': 'Run created',
  'run.changed': 'Run changed',
  'ledger.key-rotated': 'Ledger key changed',
  'ledger.tsa-added': 'Time-stamp authority added',
  'ledger.restored': 'Ledger restored',
}

/** The event in words; a signature is told by its meaning. */
export function eventWords(event: Pick<LedgerEventView, 'action' | 'payload'>): string {
  if (event.action === 'entry.signed')
    return event.payload.meaning === 'authorship' ? 'Signed' : 'Countersigned'
  return words[event.action] ?? event.action
}

/** Who did it, in words: a script acts for its owner, the laboratory's machines act by themselves. */
export function actorWords(event: Pick<LedgerEventView, 'actor'> & { actorName: string | null }): string {
  const { kind } = event.actor
  if (kind === 'system') return 'Ledger'
  if (kind === 'worker') return event.actorName ? `Worker, for ${event.actorName}` : 'Worker'
  if (kind === 'token') return event.actorName ? `Script of ${event.actorName}` : 'Script'
  return event.actorName ?? 'Person not shown'
}

const subjectWords: Record<string, string> = {
  laboratory: 'the laboratory',
  notebook: 'a notebook',
  entry: 'an entry',
  run: 'a run',
  person: 'a person',
  key: 'a key',
  apparatus: 'a piece of apparatus',
}

export function subjectInWords(
  event: Pick<LedgerEventView, 'subject'> & { subjectName: string | null },
): string {
  return event.subjectName ?? subjectWords[event.subject.kind] ?? event.subject.kind
}

/** The filters over the chain. Each names one action, as the interface asks for it. */
export const eventFilters = [
  { value: 'all', label: 'All', action: undefined },
  { value: 'signed', label: 'Signatures', action: 'entry.signed' },
  { value: 'sealed', label: 'Seals', action: 'entry.sealed' },
  { value: 'returned', label: 'Returns', action: 'entry.returned' },
  { value: 'amended', label: 'Amendments', action: 'entry.amended' },
  { value: 'keys', label: 'Keys', action: 'key.certified' },
  { value: 'exports', label: 'Exports', action: 'entry.exported' },
] as const
export type EventFilterName = (typeof eventFilters)[number]['value']
