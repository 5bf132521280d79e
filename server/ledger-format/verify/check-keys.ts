import { sameBytes } from '../bytes.ts'
import { canonicalBytes, parseCanonical } from '../canonical-json.ts'
import { shortDigest } from '../bundle/layout.ts'
import { fromBase64, sha256Hex } from '../digest.ts'
import { endorsementBytes, endorsementForm, type Endorsement } from '../endorsement.ts'
import { enrolmentForm, type Enrolment } from '../enrolment.ts'
import { eventPayloads } from '../event-payloads.ts'
import { checkForm } from '../forms.ts'
import type { Case } from './case.ts'
import { checkEvents, eventsOf, type VerifiedEvent } from './check-events.ts'
import { need, present, Wrong } from './report.ts'
import { checkSigned } from './signed-by.ts'

/** One folder of keys/: an enrolment, its events, and who endorsed it. */
export class VerifiedKey {
  events: VerifiedEvent[] = []
  endorsement: Endorsement | null = null

  constructor(
    /** The folder, with its slash at the end. */
    readonly path: string,
    readonly enrolment: Enrolment,
    readonly sha256: string,
    readonly isRoot: boolean,
  ) {}

  get publicKey(): Uint8Array {
    return fromBase64(this.enrolment.publicKey)
  }

  /** Sequence from which the key counts: its endorsement, or the root's enrolment. */
  opensAt(): number {
    if (this.isRoot)
      return present(eventsOf(this.events, 'key.root-enrolled')[0], 'no key.root-enrolled').event.sequence
    const digest = sha256Hex(endorsementBytes(present(this.endorsement, 'no endorsement')))
    const endorsed = eventsOf(this.events, 'key.endorsed').find(
      ({ payload }) => payload.endorsementSha256 === digest,
    )
    return present(endorsed, 'no key.endorsed names the endorsement').event.sequence
  }

  isRevokedBefore(sequence: number): boolean {
    return eventsOf(this.events, 'key.revoked').some(({ event }) => event.sequence < sequence)
  }
}

/** keys/: every enrolment, its own signature, its chain, its endorsement up to the root (shapes 1, "Checks, keys"). */
export function checkKeys(c: Case): void {
  const base = 'data/keys/'
  for (const subject of c.folders(base)) {
    for (const short of c.folders(`${base}${subject}/`)) checkFolder(c, subject, short)
  }
  const endorsed = [...c.keys.values()].filter((key) => !key.isRoot)
  for (const key of endorsed)
    c.report.check('endorsement', `${key.path}endorsement.json`, () => checkEndorsement(c, key))
  for (const key of endorsed)
    c.report.check('endorser', `${key.path}endorsement.json`, () => checkEndorser(c, key))
  c.report.check('root enrolment', base, () => {
    need(c.keys.has(c.anchors.rootEnrolmentSha256), 'the root’s folder is absent')
  })
  c.report.check('superseded keys', base, () => checkSuperseded(c))
}

function checkFolder(c: Case, subject: string, short: string): void {
  const path = `data/keys/${subject}/${short}/`
  const key = c.report.check('enrolment', `${path}enrolment.json`, () => readEnrolment(c, path))
  c.report.check('enrolment', `${path}enrolment.json`, () => {
    const { enrolment, sha256 } = present(key, 'not readable')
    checkForm(enrolmentForm, enrolment)
    need(
      subject === enrolment.subjectId && short === shortDigest(sha256),
      'folder is not that of the enrolment',
    )
    need(enrolment.laboratory === c.bundle.laboratory, 'another laboratory')
  })
  c.report.check('enrolment signature', `${path}enrolment.sig`, () => {
    const signature = c.read(`${path}enrolment.sig`)
    checkSigned(
      present(key, 'the enrolment is not readable').publicKey,
      c.read(`${path}enrolment.json`),
      signature,
    )
  })
  const events = checkEvents(c, path, { kind: 'key', id: key?.enrolment.id ?? '' })
  if (!key) return
  key.events = events
  c.report.check('key events', `${path}events.jsonl`, () => checkKeyEvents(key))
}

function readEnrolment(c: Case, path: string): VerifiedKey {
  const bytes = c.read(`${path}enrolment.json`)
  const sha256 = sha256Hex(bytes)
  const enrolment = parseCanonical(bytes) as unknown as Enrolment
  if (typeof enrolment !== 'object' || enrolment === null) throw new Wrong('not an enrolment')
  const key = new VerifiedKey(path, enrolment, sha256, sha256 === c.rootEnrolment)
  c.keys.set(sha256, key)
  return key
}

function checkKeyEvents(key: VerifiedKey): void {
  const first = present(key.events[0], 'no events').event
  const enrolments = [...eventsOf(key.events, 'key.root-enrolled'), ...eventsOf(key.events, 'key.enrolled')]
  const due = key.isRoot ? 'key.root-enrolled' : 'key.enrolled'
  need(first.action === due && enrolments.length === 1, 'not enrolled once, at first, as root or not')
  const { subjectId, supersedes } = key.enrolment
  const payload = { subjectId, enrolmentSha256: key.sha256, supersedes }
  need(sameBytes(canonicalBytes(first.payload), canonicalBytes(payload)), 'event names another enrolment')
  const known = key.events.filter(({ event }) => Object.hasOwn(eventPayloads, event.action))
  need(
    known.every(({ event }) => event.payload.enrolmentSha256 === key.sha256),
    'an event names another enrolment',
  )
}

function checkEndorsement(c: Case, key: VerifiedKey): void {
  const path = `${key.path}endorsement.`
  // Called for even when the document is damaged, so that the layout does not refuse it as well.
  c.call(`${path}sig`)
  const bytes = c.read(`${path}json`)
  const value = parseCanonical(bytes) as unknown
  checkForm(endorsementForm, value)
  key.endorsement = value
  const same =
    value.enrolmentSha256 === key.sha256 &&
    value.subjectId === key.enrolment.subjectId &&
    value.publicKey === key.enrolment.publicKey
  need(same, 'endorses another enrolment')
  need(value.laboratory === c.bundle.laboratory, 'another laboratory')
  const digest = sha256Hex(bytes)
  const named = eventsOf(key.events, 'key.endorsed').some(
    ({ payload }) => payload.endorsementSha256 === digest,
  )
  need(named, 'no key.endorsed names it')
  c.report.check('endorsement signature', `${path}sig`, () => {
    const endorser = present(
      c.keys.get(value.endorser.enrolmentSha256),
      'the endorser’s key is not in the bundle',
    )
    checkSigned(endorser.publicKey, bytes, c.read(`${path}sig`))
  })
}

function checkEndorser(c: Case, key: VerifiedKey): void {
  const who = present(key.endorsement, 'no endorsement').endorser
  const endorser = present(c.keys.get(who.enrolmentSha256), 'the endorser’s key is not in the bundle')
  const at = key.opensAt()
  const another = who.subjectId === endorser.enrolment.subjectId && who.subjectId !== key.enrolment.subjectId
  need(another, 'endorser is not another person')
  const { actor } = present(c.events.get(at), 'no such event').event
  need(actor.kind === 'person' && actor.id === who.subjectId, 'key.endorsed has another actor')
  need(endorser.opensAt() < at && !endorser.isRevokedBefore(at), 'endorser was not endorsed then, or revoked')
}

function checkSuperseded(c: Case): void {
  for (const key of c.keys.values()) {
    const old = c.keys.get(key.enrolment.supersedes ?? '')
    if (!old) continue
    need(old.enrolment.subjectId === key.enrolment.subjectId, `supersedes somebody else’s key: ${key.path}`)
    const certified = eventsOf(key.events, 'key.certified').map(({ event }) => event.sequence)
    const inTime = certified.length === 0 || old.isRevokedBefore(Math.min(...certified))
    need(inTime, `old key not revoked before the new one’s certificate: ${old.path}`)
  }
}

/** Keys that signers lead to: they, their endorsers, and so on; the root always. */
export function reachedFrom(c: Case, signers: Iterable<string>): Set<string> {
  const reached = new Set<string>(c.rootEnrolment === undefined ? [] : [c.rootEnrolment])
  const todo = [...signers]
  for (let digest = todo.pop(); digest !== undefined; digest = todo.pop()) {
    const key = c.keys.get(digest)
    if (!key || reached.has(digest)) continue
    reached.add(digest)
    if (key.endorsement) todo.push(key.endorsement.endorser.enrolmentSha256)
  }
  return reached
}

/** keys/ holds each signer, his endorser, and so on up to the root; nobody else. */
export function checkUsedKeys(c: Case): void {
  const used = reachedFrom(
    c,
    [...c.entries.values()].flatMap((entry) => [...entry.signers]),
  )
  for (const key of c.keys.values()) {
    if (!used.has(key.sha256))
      c.report.add('layout', key.path, false, 'a key that no signature of this bundle leads to')
  }
}
