import type { RecordBody } from '../../ledger-format/record-body.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { peopleById } from '../people/index.ts'
import type { Gathered } from './gather.ts'

type Act = RecordBody['contributors'][number]['acts'][number]

/**
 * Whoever supplied a run, file, reading or calculation, also one that the text does not use: such a person never
 * witnesses. Readings come from the ledger, since an earlier choice of somebody else counts too.
 */
export async function contributorsOf(
  services: Pick<Services, 'db'>,
  gathered: Gathered,
  t: Transaction,
): Promise<RecordBody['contributors']> {
  const acts = new Map<string, Set<Act>>()
  const note = (personId: string | null, act: Act) => {
    if (personId) acts.set(personId, (acts.get(personId) ?? new Set()).add(act))
  }
  for (const { createdBy } of gathered.runs) note(createdBy, 'run')
  for (const { uploadedBy } of gathered.files) note(uploadedBy, 'file')
  for (const { readingBy } of gathered.files) note(readingBy, 'reading')
  for (const { actorId } of await readingChoices(services, gathered, t)) note(actorId, 'reading')
  for (const { createdBy } of gathered.calculations) note(createdBy, 'calculation')
  const people = await peopleById(services.db, [...acts.keys()], t)
  return [...acts].map(([subjectId, done]) => ({
    subjectId,
    name: people.get(subjectId)?.name ?? subjectId,
    acts: [...done],
  }))
}

function readingChoices(services: Pick<Services, 'db'>, { entry, runs }: Gathered, t: Transaction) {
  return services.db.rows<{ actorId: string | null }>(
    `select distinct actor_id as "actorId" from record.events
     where action = 'reading.set' and subject_id = any (array[:ids]::uuid[])`,
    { ids: [entry.id, ...runs.map(({ id }) => id)] },
    t,
  )
}
