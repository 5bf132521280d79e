import { S3Error } from './errors.ts'

/** Retention of one object version: nobody deletes it before `until` (ISO 8601). */
export interface Retention {
  mode: 'GOVERNANCE' | 'COMPLIANCE'
  until: string
}

/** What a bucket gives every new version that names no retention of its own. */
export interface DefaultRetention {
  mode: Retention['mode']
  unit: 'Days' | 'Years'
  length: number
}

export interface Locked {
  retention: Retention | null
  legalHold: boolean
}

const protectedVersion = () =>
  new S3Error('AccessDenied', 'Access Denied because object protected by object lock.')

const isActive = (retention: Retention | null, now: number) =>
  retention !== null && Date.parse(retention.until) > now

/** Throws AccessDenied when a version may not be deleted now. `bypass`: governance retention may be overridden. */
export function checkDeletable(version: Locked, now: number, bypass: boolean): void {
  if (version.legalHold) throw protectedVersion()
  if (!isActive(version.retention, now)) return
  if (version.retention?.mode === 'GOVERNANCE' && bypass) return
  throw protectedVersion()
}

/**
 * Throws when a retention may not be replaced. Extending is always allowed; compliance is never shortened, weakened or
 * removed before its date; governance only by bypass. (Rules of the S3 user guide, "Locking objects".)
 */
export function checkRetentionChange(
  current: Retention | null,
  next: Retention | null,
  now: number,
  bypass: boolean,
): void {
  if (next && Date.parse(next.until) <= now) {
    throw new S3Error('InvalidArgument', 'The retain until date must be in the future.')
  }
  if (!current || !isActive(current, now)) return
  const longer = next !== null && Date.parse(next.until) >= Date.parse(current.until)
  const strongEnough = next !== null && (next.mode === current.mode || next.mode === 'COMPLIANCE')
  if (longer && strongEnough) return
  if (current.mode === 'GOVERNANCE' && bypass) return
  throw protectedVersion()
}

/** Parses mode and date of a retention. Throws InvalidArgument (or the given code) on anything else. */
export function parseRetention(
  mode: string | undefined,
  until: string | undefined,
  code: 'InvalidArgument' | 'MalformedXML',
): Retention {
  if (mode !== 'GOVERNANCE' && mode !== 'COMPLIANCE') {
    throw new S3Error(code, 'The retention mode must be GOVERNANCE or COMPLIANCE.')
  }
  const isDate =
    until !== undefined && /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d+)?(Z|[+-]\d\d:\d\d)$/.test(until)
  const time = isDate ? Date.parse(until) : NaN
  if (Number.isNaN(time)) throw new S3Error(code, 'The retain until date must be an ISO 8601 time with zone.')
  return { mode, until: new Date(time).toISOString() }
}

/** The retention that a bucket's default gives a version made now. */
export function defaultRetention(rule: DefaultRetention | null, now: number): Retention | null {
  if (!rule) return null
  const until = new Date(now)
  if (rule.unit === 'Days') until.setUTCDate(until.getUTCDate() + rule.length)
  else until.setUTCFullYear(until.getUTCFullYear() + rule.length)
  return { mode: rule.mode, until: until.toISOString() }
}
