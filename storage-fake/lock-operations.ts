import { receiveText } from './body.ts'
import type { Version } from './buckets.ts'
import type { Call, Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { checkRetentionChange, parseRetention, type DefaultRetention, type Retention } from './locks.ts'
import { requireLock } from './object-headers.ts'
import { namedVersion } from './objects.ts'
import { childElement, childText, parseDocument, xmlDocument, type XmlElement } from './xml.ts'

const malformed = (message: string) => new S3Error('MalformedXML', message)

function parseRule(root: XmlElement): DefaultRetention | null {
  if (childText(root, 'ObjectLockEnabled') !== 'Enabled')
    throw malformed('ObjectLockEnabled must be Enabled.')
  const rule = childElement(root, 'Rule')
  const retention = rule && childElement(rule, 'DefaultRetention')
  if (!rule) return null
  if (!retention) throw malformed('A rule needs a DefaultRetention.')
  const mode = childText(retention, 'Mode')
  const [days, years] = [childText(retention, 'Days'), childText(retention, 'Years')]
  const length = Number(days ?? years)
  if (mode !== 'GOVERNANCE' && mode !== 'COMPLIANCE')
    throw malformed('The mode must be GOVERNANCE or COMPLIANCE.')
  if ((days === undefined) === (years === undefined))
    throw malformed('Exactly one of Days and Years must be given.')
  if (!Number.isInteger(length) || length < 1 || length > (days === undefined ? 100 : 36_500)) {
    throw new S3Error('InvalidArgument', 'The default retention must be 1 to 36500 days or 1 to 100 years.')
  }
  return { mode, unit: days === undefined ? 'Years' : 'Days', length }
}

/** PUT ?object-lock: sets or clears the default retention of a bucket that was made with object lock. */
export async function putLockConfiguration(call: Call): Promise<Reply> {
  const document = await receiveText(call.request, call.payloadHash)
  return call.buckets.serial.run(call.bucket, async () => {
    const bucket = await call.buckets.bucket(call.bucket)
    if (!bucket.objectLock) {
      throw new S3Error('InvalidBucketState', 'Object lock can only be configured on a bucket made with it.')
    }
    const rule = parseRule(parseDocument(document, 'ObjectLockConfiguration'))
    await call.buckets.saveBucket({ ...bucket, defaultRetention: rule })
    return { status: 200 }
  })
}

/** GET ?object-lock */
export async function getLockConfiguration(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  if (!bucket.objectLock) {
    throw new S3Error(
      'ObjectLockConfigurationNotFoundError',
      'Object Lock configuration does not exist for this bucket.',
    )
  }
  const rule = bucket.defaultRetention
  const xml = xmlDocument('ObjectLockConfiguration', {
    ObjectLockEnabled: 'Enabled',
    Rule: rule ? { DefaultRetention: { Mode: rule.mode, [rule.unit]: rule.length } } : undefined,
  })
  return { status: 200, xml }
}

async function lockable(call: Call): Promise<Version> {
  requireLock(await call.buckets.bucket(call.bucket))
  const version = await namedVersion(call)
  if (version.deleteMarker) throw new S3Error('MethodNotAllowed', 'A delete marker cannot be locked.')
  return version
}

/** Replaces the lock of the named version, one change of a key after another. */
async function changeLock(call: Call, change: (version: Version) => Version): Promise<Reply> {
  return call.buckets.serial.run(`${call.bucket}/${call.key}`, async () => {
    await call.buckets.saveVersion(call.bucket, change(await lockable(call)))
    return { status: 200 }
  })
}

function retentionOf(root: XmlElement): Retention | null {
  // An empty document asks to remove the retention.
  if (root.children.length === 0) return null
  return parseRetention(childText(root, 'Mode'), childText(root, 'RetainUntilDate'), 'MalformedXML')
}

/** PUT ?retention */
export async function putRetention(call: Call): Promise<Reply> {
  const root = parseDocument(await receiveText(call.request, call.payloadHash), 'Retention')
  return changeLock(call, (version) => {
    const retention = retentionOf(root)
    checkRetentionChange(version.retention, retention, call.now, call.bypassGovernance)
    return { ...version, retention }
  })
}

/** GET ?retention */
export async function getRetention(call: Call): Promise<Reply> {
  const { retention } = await lockable(call)
  if (!retention) {
    throw new S3Error('NoSuchObjectLockConfiguration', 'The version has no retention.')
  }
  return {
    status: 200,
    xml: xmlDocument('Retention', { Mode: retention.mode, RetainUntilDate: retention.until }),
  }
}

/** PUT ?legal-hold */
export async function putLegalHold(call: Call): Promise<Reply> {
  const root = parseDocument(await receiveText(call.request, call.payloadHash), 'LegalHold')
  const status = childText(root, 'Status')
  if (status !== 'ON' && status !== 'OFF') throw malformed('The status of a legal hold must be ON or OFF.')
  return changeLock(call, (version) => ({ ...version, legalHold: status === 'ON' }))
}

/** GET ?legal-hold */
export async function getLegalHold(call: Call): Promise<Reply> {
  const { legalHold } = await lockable(call)
  return { status: 200, xml: xmlDocument('LegalHold', { Status: legalHold ? 'ON' : 'OFF' }) }
}
