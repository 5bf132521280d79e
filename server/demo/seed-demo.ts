import type { DemoAccount } from '../platform/identity/demo-accounts.ts'
import { demoAccounts } from '../platform/identity/demo-accounts.ts'
import { identityProvider } from '../platform/identity/sign-in.ts'
import { settableClock } from '../platform/clock.ts'
import type { Services } from '../platform/services.ts'
import { openLaboratory } from '../features/laboratory/index.ts'
import { addPerson } from '../features/people/index.ts'
import { createTimeStampAuthority } from '../fakes/time-stamp-authority.ts'
import { registerApparatus } from './apparatus.ts'
import { DemoBench, type DemoPerson } from './bench.ts'
import type { Act, Scene } from './scenario/act.ts'
import { detectorSheets } from './scenario/detectors.ts'
import { heraldedPairs } from './scenario/heralded-pairs.ts'
import { nanobeamDots } from './scenario/nanobeam-dots.ts'
import { endorse, enrol } from './signer.ts'
import { enrolmentDigest } from './enrolment-digest.ts'

const DAY_MS = 86_400_000
const OPENED_DAYS_AGO = 60

/**
 * Makes the demonstration laboratory in an empty database: people, keys, equipment, notebooks. It runs forward under a clock
 * of its own that the local time-stamp authority shares, so that nothing is dated back and the ledger ends before now.
 */
export async function seedDemo(base: Services, tell: (step: string) => void): Promise<void> {
  const today = startOfDay(new Date())
  const clock = settableClock(new Date(today - OPENED_DAYS_AGO * DAY_MS))
  const authority = await createTimeStampAuthority({ folder: authorityFolder(base), clock })
  const services: Services = { ...base, clock, timeStamps: (request) => authority.respond(request) }
  tell('opening the laboratory')
  await openLaboratory(services, { name: services.config.laboratory.name, demo: true })
  const people = await addPeople(services, clock)
  const bench = new DemoBench(services, clock)
  try {
    const scene: Scene = { bench, ...people, apparatus: await registerApparatus(services) }
    const acts = [...nanobeamDots(), ...heraldedPairs(), ...detectorSheets()].map((act) => ({ act, time: timeOf(act, today) }))
    acts.sort((a, b) => a.time - b.time)
    for (const [index, { act, time }] of acts.entries()) {
      clock.set(new Date(Math.max(time, clock.now().getTime())))
      tell(`writing the demonstration, ${index + 1} of ${acts.length}`)
      await act.play(scene)
    }
  } finally {
    await bench.close()
  }
}

/** Acts of today are set before the present moment, whatever the time of day. */
function timeOf(act: Act, today: number): number {
  const [hours, minutes] = act.at.split(':').map(Number) as [number, number]
  const time = today - act.daysAgo * DAY_MS + (hours * 60 + minutes) * 60_000
  return act.daysAgo > 0 ? time : Date.now() - 3_600_000 + (hours * 60 + minutes) * 60_000
}

function startOfDay(now: Date): number {
  return now.getTime() - (now.getTime() % DAY_MS)
}

function authorityFolder(services: Services): string {
  return services.config.timeStamps.chainFile.replace(/\/[^/]*$/, '')
}

type People = Pick<Scene, 'maren' | 'teo' | 'farid' | 'noor'>

/** The manager's key is the root; the manager endorses the supervisor, who endorses the others. */
async function addPeople(services: Services, clock: { advance(ms: number): void }): Promise<People> {
  const made = new Map<string, DemoPerson>()
  const order = ['bram', 'farid', 'maren', 'teo', 'noor']
  for (const login of order) {
    const account = demoAccounts.find((a) => a.login === login) as DemoAccount
    const personId = await addPerson(services, {
      login,
      name: account.name,
      email: account.email,
      provider: identityProvider,
      providerAccountId: String(account.accountId),
      roles: [account.role],
    })
    const signer = await enrol(services, personId)
    const endorser = login === 'bram' ? null : made.get(login === 'farid' ? 'bram' : 'farid')
    if (endorser) {
      clock.advance(600_000)
      await endorse(services, { personId: endorser.actor.personId, signer: endorser.signer }, personId, await enrolmentDigest(services, personId))
    }
    clock.advance(3_600_000)
    const { name, role } = account
    made.set(login, { signer, actor: { kind: 'person', personId, name, login, roles: [role], scopes: ['read', 'record'] } })
  }
  const person = (login: string) => made.get(login) as DemoPerson
  return { maren: person('maren'), teo: person('teo'), farid: person('farid'), noor: person('noor') }
}
