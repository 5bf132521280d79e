import { renderSvg } from '../../physics/figure-svg/render-svg.ts'
import { kindDefinition, parametersJsonSchema } from '../../physics/registry.ts'
import { figureCsv } from '../../physics/table-csv.ts'
import { filesIn, type NormalDocument } from '../../document/index.ts'
import type { RecordBody, RecordCalculation } from '../../ledger-format/record-body.ts'
import { describeBody } from '../../ledger-format/record.ts'
import type { Services } from '../../platform/services.ts'
import { resultBytes } from '../calculations/index.ts'
import type { EntryRow } from '../entries/index.ts'
import { filesOfEntry } from '../files/index.ts'
import { laboratory } from '../laboratory/index.ts'
import { peopleById } from '../people/index.ts'
import { bodyBytes, entrySignatures, sealOf } from '../signatures/index.ts'
import { parameterWords } from './parameter-words.ts'
import type { SheetCalculation, SheetInput } from './sheet-input.ts'

const LARGEST_IMAGE = 20_000_000
const imageTypes: [type: string, magic: string][] = [
  ['image/png', '89504e47'],
  ['image/jpeg', 'ffd8ff'],
  ['image/webp', '52494646'],
]

/** Reads what a print of a sealed entry shows: the signed body, its results drawn anew, the signatures and the seal. */
export async function gatherSheet(services: Services, entry: EntryRow): Promise<SheetInput> {
  const { db } = services
  if (entry.bodySha256 === null) throw new Error(`Entry ${entry.id} has no signed body.`)
  const { body, bodySha256 } = describeBody(await bodyBytes(db, entry.bodySha256))
  const seal = await sealOf(services, entry.id)
  if (!seal) throw new Error(`Entry ${entry.id} is not sealed.`)
  const calculations: SheetCalculation[] = []
  for (const calculation of body.calculations) calculations.push(await drawn(services, calculation))
  return {
    body,
    bodySha256,
    zone: (await laboratory(services)).zone,
    signatures: await entrySignatures(services, [entry.id]),
    seal,
    calculations,
    images: await imagesOf(services, entry.id, body),
    names: await namesOf(services, body),
  }
}

async function drawn(services: Services, calculation: RecordCalculation): Promise<SheetCalculation> {
  const definition = kindDefinition(calculation.kind, calculation.version)
  const result = await resultBytes(services.db, calculation.resultSha256)
  const { figure } = await definition.loadFigure()
  const data = figure(JSON.parse(result.toString('utf8')), calculation.parameters)
  return {
    id: calculation.id,
    label: calculation.label,
    title: definition.title,
    parameters: parameterWords(parametersJsonSchema(definition), calculation.parameters),
    result,
    figure: data,
    svg: data && renderSvg(data),
    csv: data && figureCsv(data),
  }
}

/** Pictures of the text as data URLs: png, jpeg and webp by their first bytes, nothing else (threat B12). */
async function imagesOf(services: Services, entryId: string, body: RecordBody): Promise<Map<string, string>> {
  const images = new Map<string, string>()
  const wanted = filesIn(body.content as unknown as NormalDocument)
  if (wanted.length === 0) return images
  for (const file of await filesOfEntry(services.db, entryId)) {
    if (!wanted.includes(file.id) || Number(file.size) > LARGEST_IMAGE) continue
    const bytes = await services.storage.getBytes(file.objectKey, file.objectVersion)
    const type = imageTypes.find(([, magic]) => bytes.subarray(0, 4).toString('hex').startsWith(magic))?.[0]
    if (type) images.set(file.id, `data:${type};base64,${bytes.toString('base64')}`)
  }
  return images
}

async function namesOf(services: Services, body: RecordBody): Promise<Map<string, string>> {
  const ids = [
    ...body.files.map(({ uploadedBy }) => uploadedBy),
    ...body.history.returns.map(({ bySubjectId }) => bySubjectId),
  ]
  const people = await peopleById(services.db, ids)
  return new Map([...people].map(([id, { name }]) => [id, name]))
}
