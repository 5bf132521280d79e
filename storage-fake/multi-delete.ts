import { receiveText } from './body.ts'
import { header, type Call, type Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { deleteOne } from './objects.ts'
import { childText, parseDocument, xmlDocument, type Content, type XmlElement } from './xml.ts'

const mostKeys = 1000

interface Wanted {
  key: string
  versionId: string | undefined
}

function wantedOf(element: XmlElement): Wanted {
  // A key keeps its blanks, so the text is taken as it stands.
  const key = element.children.find((child) => child.name === 'Key')?.text
  if (!key) throw new S3Error('MalformedXML', 'Every Object needs a Key.')
  return { key, versionId: childText(element, 'VersionId') }
}

async function outcome(call: Call, wanted: Wanted): Promise<{ deleted?: Content; error?: Content }> {
  const named = { Key: wanted.key, VersionId: wanted.versionId }
  try {
    const { marker } = await deleteOne(call, wanted.key, wanted.versionId)
    const markerFields = marker ? { DeleteMarker: true, DeleteMarkerVersionId: marker.versionId } : {}
    return { deleted: { ...named, ...markerFields } }
  } catch (error) {
    if (error instanceof S3Error) return { error: { ...named, Code: error.code, Message: error.message } }
    throw error
  }
}

/** POST ?delete: up to a thousand keys or versions, each with its own outcome. */
export async function deleteObjects(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  if (header(call, 'content-md5') === undefined) {
    throw new S3Error('InvalidRequest', 'Missing required header for this request: Content-MD5.')
  }
  const root = parseDocument(await receiveText(call.request, call.payloadHash), 'Delete')
  const wanted = root.children.filter((child) => child.name === 'Object').map(wantedOf)
  if (wanted.length === 0 || wanted.length > mostKeys) {
    throw new S3Error('MalformedXML', `Between 1 and ${mostKeys} objects can be deleted at once.`)
  }
  const outcomes: { deleted?: Content; error?: Content }[] = []
  for (const one of wanted) outcomes.push(await outcome(call, one))
  const quiet = childText(root, 'Quiet') === 'true'
  const xml = xmlDocument('DeleteResult', {
    Deleted: quiet ? [] : outcomes.flatMap(({ deleted }) => deleted ?? []),
    Error: outcomes.flatMap(({ error }) => error ?? []),
  })
  return { status: 200, xml }
}
