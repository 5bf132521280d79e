import * as bucketOperations from './bucket-operations.ts'
import type { Call, Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { listObjects, listVersions } from './listing.ts'
import * as lockOperations from './lock-operations.ts'
import { deleteObjects } from './multi-delete.ts'
import * as multipart from './multipart.ts'
import { answerOverrides, deleteObject, getObject, putObject } from './objects.ts'

interface Operation {
  method: string
  level: 'service' | 'bucket' | 'object'
  /** Query parameters that choose the operation; all must be there. */
  needs: string[]
  /** Query parameters it also takes. Any other parameter makes the request one that is not implemented. */
  takes: string[]
  hasBody: boolean
  run: (call: Call) => Promise<Reply>
}

type Given = [needs: string[], takes: string[], run: (call: Call) => Promise<Reply>]

function operation(
  method: string,
  level: Operation['level'],
  [needs, takes, run]: Given,
  hasBody = false,
): Operation {
  return { method, level, needs, takes, hasBody, run }
}

const get = (level: Operation['level'], ...given: Given) => operation('GET', level, given)
const head = (level: Operation['level'], ...given: Given) => operation('HEAD', level, given)
const remove = (level: Operation['level'], ...given: Given) => operation('DELETE', level, given)
const put = (level: Operation['level'], ...given: Given) => operation('PUT', level, given, true)
const post = (level: Operation['level'], ...given: Given) => operation('POST', level, given, true)

const listParameters = ['prefix', 'delimiter', 'encoding-type', 'max-keys']
const listV2 = ['continuation-token', 'start-after', 'fetch-owner', ...listParameters]
const uploadPages = ['prefix', 'delimiter', 'max-uploads', 'key-marker', 'upload-id-marker']

/** Everything this server can do. */
const operations: Operation[] = [
  get('service', [], [], bucketOperations.listBuckets),
  put('bucket', [], [], bucketOperations.createBucket),
  head('bucket', [], [], bucketOperations.headBucket),
  remove('bucket', [], [], bucketOperations.deleteBucket),
  get('bucket', ['location'], [], bucketOperations.getLocation),
  get('bucket', ['versioning'], [], bucketOperations.getVersioning),
  put('bucket', ['versioning'], [], bucketOperations.putVersioning),
  get('bucket', ['list-type'], listV2, listObjects),
  get('bucket', ['versions'], ['key-marker', 'version-id-marker', ...listParameters], listVersions),
  get('bucket', ['uploads'], uploadPages, multipart.listUploads),
  post('bucket', ['delete'], [], deleteObjects),
  get('bucket', ['object-lock'], [], lockOperations.getLockConfiguration),
  put('bucket', ['object-lock'], [], lockOperations.putLockConfiguration),
  put('object', [], [], putObject),
  get('object', [], ['versionId', ...answerOverrides], getObject),
  head('object', [], ['versionId'], getObject),
  remove('object', [], ['versionId'], deleteObject),
  operation('POST', 'object', [['uploads'], [], multipart.startUpload]),
  put('object', ['partNumber', 'uploadId'], [], multipart.putPart),
  get('object', ['uploadId'], ['max-parts', 'part-number-marker', 'encoding-type'], multipart.listParts),
  post('object', ['uploadId'], [], multipart.completeUpload),
  remove('object', ['uploadId'], [], multipart.abortUpload),
  get('object', ['retention'], ['versionId'], lockOperations.getRetention),
  put('object', ['retention'], ['versionId'], lockOperations.putRetention),
  get('object', ['legal-hold'], ['versionId'], lockOperations.getLegalHold),
  put('object', ['legal-hold'], ['versionId'], lockOperations.putLegalHold),
]

/** Headers beginning with x-amz- that are understood; others ask for something that would silently not happen. */
const knownHeaders = [
  'x-amz-date',
  'x-amz-content-sha256',
  'x-amz-bucket-object-lock-enabled',
  'x-amz-bypass-governance-retention',
  'x-amz-object-lock-mode',
  'x-amz-object-lock-retain-until-date',
  'x-amz-object-lock-legal-hold',
]
const conditionalHeaders = ['if-match', 'if-none-match', 'if-modified-since', 'if-unmodified-since']

function refuseUnknownHeaders(headers: Call['request']['headers']): void {
  const unknown = Object.keys(headers).find(
    (name) =>
      conditionalHeaders.includes(name) ||
      (name.startsWith('x-amz-') && !name.startsWith('x-amz-meta-') && !knownHeaders.includes(name)),
  )
  if (unknown)
    throw new S3Error('NotImplemented', `The header ${unknown} implies what is not implemented here.`)
}

/** Finds the operation of a request. Throws NotImplemented for whatever is not in the table. */
export function operationOf(call: Call): Operation {
  refuseUnknownHeaders(call.request.headers)
  const level = call.bucket === '' ? 'service' : call.key === '' ? 'bucket' : 'object'
  const names = [...call.query.keys()].filter((name) => !/^X-Amz-/i.test(name))
  const found = operations.find(
    (o) =>
      o.method === call.request.method &&
      o.level === level &&
      o.needs.every((name) => names.includes(name)) &&
      names.every((name) => o.needs.includes(name) || o.takes.includes(name)),
  )
  const listVersion = call.query.get('list-type')
  if (!found || (listVersion !== undefined && listVersion !== '2')) {
    const asked = `${call.request.method} of a ${level}${names.length > 0 ? ` with ${names.join(', ')}` : ''}`
    throw new S3Error('NotImplemented', `${asked} is not implemented here.`)
  }
  return found
}
