import { createHash } from 'node:crypto'
import { AFRelationship, PDFDocument, PDFHexString, PDFName } from 'pdf-lib'

export interface PdfParts {
  title: string
  author: string
  /** Of the seal: the only date in the file. */
  time: Date
  /** Bytes that were signed, attached under their names. */
  attachments: { name: string; bytes: Uint8Array; description: string }[]
}

/**
 * Makes a printed page an evidence file: signed records attached, title and language set, the printer's dates and ids
 * replaced by those of the seal, so that nothing in it depends on when it was printed.
 */
export async function finishPdf(printed: Uint8Array, parts: PdfParts): Promise<Buffer> {
  const pdf = await PDFDocument.load(printed, { updateMetadata: false })
  const { time } = parts
  for (const { name, bytes, description } of parts.attachments) {
    await pdf.attach(bytes, name, {
      mimeType: 'application/json',
      description,
      creationDate: time,
      modificationDate: time,
      afRelationship: AFRelationship.Source,
    })
  }
  pdf.setTitle(parts.title, { showInWindowTitleBar: true })
  pdf.setAuthor(parts.author)
  pdf.setLanguage('en-GB')
  pdf.setCreator('Halfsilver')
  pdf.setProducer('Halfsilver')
  pdf.setCreationDate(time)
  pdf.setModificationDate(time)
  const xmp = pdf.context.stream(xmpOf(parts), { Type: 'Metadata', Subtype: 'XML' })
  pdf.catalog.set(PDFName.of('Metadata'), pdf.context.register(xmp))
  const id = createHash('sha256').update(xmpOf(parts))
  for (const { bytes } of parts.attachments) id.update(bytes)
  const digits = PDFHexString.of(id.digest('hex').slice(0, 32))
  pdf.context.trailerInfo.ID = pdf.context.obj([digits, digits])
  return Buffer.from(await pdf.save({ useObjectStreams: false, updateFieldAppearances: false }))
}

function xmpOf({ title, author, time }: PdfParts): string {
  const date = time.toISOString()
  const xml = (words: string) => words.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`)
  return `<?xpacket begin="\ufeff" id="W5M0MpCehiHzreSzNTczkc9d"?>
<x:xmpmeta xmlns:x="adobe:ns:meta/"><rdf:RDF xmlns:rdf="http://www.w3.org/1999/02/22-rdf-syntax-ns#">
<rdf:Description rdf:about="" xmlns:dc="http://purl.org/dc/elements/1.1/" xmlns:xmp="http://ns.adobe.com/xap/1.0/">
<dc:title><rdf:Alt><rdf:li xml:lang="x-default">${xml(title)}</rdf:li></rdf:Alt></dc:title>
<dc:creator><rdf:Seq><rdf:li>${xml(author)}</rdf:li></rdf:Seq></dc:creator>
<dc:language><rdf:Bag><rdf:li>en-GB</rdf:li></rdf:Bag></dc:language>
<xmp:CreateDate>${date}</xmp:CreateDate><xmp:ModifyDate>${date}</xmp:ModifyDate><xmp:CreatorTool>Halfsilver</xmp:CreatorTool>
</rdf:Description></rdf:RDF></x:xmpmeta>
<?xpacket end="w"?>`
}
