import { receiveText } from './body.ts'
import { header, type Call, type Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { childText, parseDocument, xmlDocument } from './xml.ts'

/** GET / */
export async function listBuckets(call: Call): Promise<Reply> {
  const buckets = await call.buckets.listBuckets()
  const xml = xmlDocument('ListAllMyBucketsResult', {
    Owner: { ID: 'local', DisplayName: 'local' },
    Buckets: { Bucket: buckets.map((b) => ({ Name: b.name, CreationDate: b.createdAt })) },
  })
  return { status: 200, xml }
}

/** PUT /bucket; with x-amz-bucket-object-lock-enabled the versions in it can be locked. */
export async function createBucket(call: Call): Promise<Reply> {
  const hasBody = Number(header(call, 'content-length') ?? 0) > 0
  const document = hasBody ? await receiveText(call.request, call.payloadHash) : null
  const region =
    document && childText(parseDocument(document, 'CreateBucketConfiguration'), 'LocationConstraint')
  if (region && region !== call.region) {
    throw new S3Error('InvalidArgument', `This server has one region: ${call.region}.`)
  }
  await call.buckets.createBucket({
    name: call.bucket,
    createdAt: new Date(call.now).toISOString(),
    objectLock: header(call, 'x-amz-bucket-object-lock-enabled')?.toLowerCase() === 'true',
    defaultRetention: null,
  })
  return { status: 200, headers: { location: `/${call.bucket}` } }
}

/** HEAD /bucket */
export async function headBucket(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  return { status: 200, headers: { 'x-amz-bucket-region': call.region } }
}

/** GET ?location: us-east-1 is told as nothing, as S3. */
export async function getLocation(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  const region = call.region === 'us-east-1' ? '' : call.region
  // The one answer of S3 whose root holds the text itself.
  const xml = xmlDocument('LocationConstraint', {}).replace('></', `>${region}</`)
  return { status: 200, xml }
}

/** GET ?versioning: versions are always kept here. */
export async function getVersioning(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  return { status: 200, xml: xmlDocument('VersioningConfiguration', { Status: 'Enabled' }) }
}

/** PUT ?versioning: enabling changes nothing, suspending is refused. */
export async function putVersioning(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  const root = parseDocument(await receiveText(call.request, call.payloadHash), 'VersioningConfiguration')
  if (childText(root, 'Status') === 'Enabled') return { status: 200 }
  if (bucket.objectLock) {
    throw new S3Error('InvalidBucketState', 'Versioning cannot be suspended on a bucket with object lock.')
  }
  throw new S3Error('NotImplemented', 'This server keeps versions always: suspending is not implemented.')
}

/** DELETE /bucket */
export async function deleteBucket(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  await call.buckets.removeBucket(call.bucket)
  return { status: 204 }
}
