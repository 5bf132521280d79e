import type { SignedRecord } from '../record.ts'

/** What the crate tells about one entry, in words for readers; the records are what counts. */
export interface CrateEntry {
  /** Folder relative to data/, with its slash at the end. */
  folder: string
  records: { path: string; record: SignedRecord }[]
  /** Paths, relative to data/, of raw files that are in the bundle, by file id. */
  raw: ReadonlyMap<string, string>
  /** Paths of result files relative to data/. */
  results: readonly string[]
}

export interface CrateParts {
  name: string
  laboratory: { id: string; name: string; demo: boolean }
  /** Time of the head. */
  published: string
  release: string
  /** Every payload file, relative to data/. */
  paths: readonly string[]
  entries: readonly CrateEntry[]
}

type Entity = { '@id': string; '@type': string | string[]; [property: string]: unknown }
const reference = (id: string) => ({ '@id': id })
const references = (ids: readonly string[]) => ids.map(reference)
const pathId = (path: string) => encodeURI(path)

const mediaTypes: Record<string, string> = {
  csv: 'text/csv',
  html: 'text/html',
  json: 'application/json',
  jsonl: 'application/jsonl',
  md: 'text/markdown',
  pdf: 'application/pdf',
  pem: 'application/x-pem-file',
  svg: 'image/svg+xml',
  tsr: 'application/timestamp-reply',
  txt: 'text/plain',
}

/**
 * ro-crate-metadata.json (RO-Crate 1.2): a flat JSON-LD graph with the data set, every file, people, apparatus, runs,
 * calculations and signatures. It gives no digests: the manifests do.
 */
export function crateDocument(parts: CrateParts): unknown {
  const people = new Map<string, Entity>()
  const things = new Map<string, Entity>()
  const entryEntities = parts.entries.flatMap((entry) => describeEntry(entry, people, things))
  const inEntries = (path: string) => parts.entries.some((entry) => path.startsWith(entry.folder))
  const topLevel = parts.paths.filter((path) => !inEntries(path))
  return {
    '@context': 'https://w3id.org/ro/crate/1.2/context',
    '@graph': [
      {
        '@id': 'ro-crate-metadata.json',
        '@type': 'CreativeWork',
        about: reference('./'),
        conformsTo: reference('https://w3id.org/ro/crate/1.2'),
      },
      {
        '@id': './',
        '@type': 'Dataset',
        name: parts.name,
        description: `Sealed laboratory notebook entries of ${parts.laboratory.name}${parts.laboratory.demo ? ' (a demonstration laboratory)' : ''} with signatures, raw data and the ledger's proofs. VERIFY.md says how to check them.`,
        datePublished: parts.published,
        license: reference('#terms'),
        publisher: reference('#laboratory'),
        hasPart: [
          ...references(topLevel.map(pathId)),
          ...references(parts.entries.map((entry) => pathId(entry.folder))),
        ],
      },
      {
        '@id': '#terms',
        '@type': 'CreativeWork',
        name: 'All rights remain with the laboratory; given as evidence of its work.',
      },
      {
        '@id': '#laboratory',
        '@type': 'Organization',
        name: parts.laboratory.name,
        identifier: parts.laboratory.id,
      },
      { '@id': '#halfsilver', '@type': 'SoftwareApplication', name: 'Halfsilver', version: parts.release },
      ...parts.paths.map(fileEntity),
      ...entryEntities.map((entity) => withParts(entity, parts.paths)),
      ...people.values(),
      ...things.values(),
    ],
  }
}

function fileEntity(path: string): Entity {
  const encodingFormat = mediaTypes[/\.([a-z0-9]+)$/.exec(path)?.[1] ?? ''] ?? 'application/octet-stream'
  return { '@id': pathId(path), '@type': 'File', name: path.split('/').at(-1), encodingFormat }
}

function withParts(entity: Entity, paths: readonly string[]): Entity {
  if (entity['@type'] !== 'Dataset') return entity
  return {
    ...entity,
    hasPart: references(paths.map(pathId).filter((path) => path.startsWith(entity['@id']))),
  }
}

function describeEntry(
  entry: CrateEntry,
  people: Map<string, Entity>,
  things: Map<string, Entity>,
): Entity[] {
  const record = entry.records[0]?.record
  if (!record) return []
  const person = (id: string, name: string) => {
    people.set(id, { '@id': `#${id}`, '@type': 'Person', name })
    return reference(`#${id}`)
  }
  const dataset: Entity = {
    '@id': pathId(entry.folder),
    '@type': 'Dataset',
    name: `${record.entry.number} ${record.entry.title}`,
    identifier: record.entry.id,
    temporalCoverage: record.entry.workDate,
    author: record.authors.map((author) => person(author.subjectId, author.name)),
    contributor: record.contributors.map((helper) => person(helper.subjectId, helper.name)),
  }
  const signings = entry.records.map(({ path, record: { signing } }) => ({
    '@id': `#signing-${signing.id}`,
    '@type': 'CreateAction',
    name: signing.statement,
    agent: person(signing.signer.subjectId, signing.signer.name),
    object: reference(pathId(entry.folder)),
    result: reference(pathId(path)),
    endTime: signing.time,
  }))
  return [
    dataset,
    ...describeRuns(entry, record, things),
    ...describeCalculations(entry, record, things),
    ...signings,
  ]
}

function describeRuns(entry: CrateEntry, record: SignedRecord, things: Map<string, Entity>): Entity[] {
  return record.runs.map((run) => {
    const instruments = run.apparatus.map((item) => {
      const id = `#${item.id}-${item.version}`
      things.set(id, { '@id': id, '@type': 'IndividualProduct', name: item.name, category: item.kind })
      return reference(id)
    })
    const files = record.files.filter((file) => file.runId === run.id).map((file) => entry.raw.get(file.id))
    return {
      '@id': `#run-${run.id}`,
      '@type': 'CreateAction',
      name: `Run ${run.number}`,
      instrument: instruments,
      result: references(files.filter((path) => path !== undefined).map(pathId)),
      startTime: run.startedAt,
    }
  })
}

function describeCalculations(
  entry: CrateEntry,
  record: SignedRecord,
  things: Map<string, Entity>,
): Entity[] {
  return record.calculations.map((calculation) => {
    const engine = `#engine-${encodeURIComponent(calculation.engine)}`
    things.set(engine, {
      '@id': engine,
      '@type': 'SoftwareApplication',
      name: 'Halfsilver engine',
      version: calculation.engine,
    })
    const inputs = calculation.inputs.map((input) =>
      'fileId' in input ? entry.raw.get(input.fileId) : undefined,
    )
    const folder = `${entry.folder}calculations/${calculation.label}/`
    return {
      '@id': `#calculation-${calculation.id}`,
      '@type': 'CreateAction',
      name: `${calculation.label} ${calculation.kind}`,
      instrument: reference(engine),
      object: references(inputs.filter((path) => path !== undefined).map(pathId)),
      result: references(entry.results.filter((path) => path.startsWith(folder)).map(pathId)),
      endTime: calculation.finishedAt,
    }
  })
}
