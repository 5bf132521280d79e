import { parseJson } from '../canonical-json.ts'
import { checkForm } from '../forms.ts'
import { descriptionForm, type BundleDescription } from '../bundle/description.ts'
import { byEntryNumber, dataPath, entryFolderName, entryOrder } from '../bundle/layout.ts'
import type { Case } from './case.ts'
import { need, present } from './report.ts'

/** bundle.json, the folders it names, and the two files for people. */
export function checkDescription(c: Case): void {
  c.report.check('bundle description', dataPath.description, () => {
    const value = parseJson(c.read(dataPath.description)) as unknown
    c.bundle = (typeof value === 'object' && value !== null ? value : {}) as BundleDescription
    checkForm(descriptionForm, value)
    checkLists(c.bundle, c)
  })
  c.report.check('entry folders', 'data/entries/', () => {
    const named = c.bundle.entries.map((entry) => entry.folder).sort()
    need(c.folders('data/entries/').join('\n') === named.join('\n'), 'folders and bundle.json differ')
  })
  for (const path of [dataPath.instructions, dataPath.checker]) {
    c.report.check('present', path, () => need(c.read(path).length > 0, 'file is empty'))
  }
}

function checkLists(bundle: BundleDescription, c: Case): void {
  const numbers = bundle.entries.map((entry) => entry.number)
  need(numbers.length > 0 && isInOrder(numbers), 'entries are none or not in order')
  for (const [what, values] of [
    ['entryId', bundle.entries.map((entry) => entry.entryId)],
    ['number', numbers],
    ['folder', bundle.entries.map((entry) => entry.folder)],
    ['fileId', bundle.raw.map((file) => file.fileId)],
    ['path', bundle.raw.map((file) => file.path)],
    ['id', bundle.leftOut.map((item) => item.id)],
  ] as const) {
    need(new Set(values).size === values.length, `${what} stands twice`)
  }
  need(
    bundle.entries.every((entry) => entry.folder === entryFolderName(entry.number)),
    'folder is not the number',
  )
  const left = c.leftOut('entry')
  need(!bundle.entries.some((entry) => left.has(entry.entryId)), 'an entry is both in and left out')
  const leftNumbers = [...c.leftOutNumbers().values()]
  need(isInOrder(leftNumbers), 'entries of leftOut are not in order')
  const all = [...numbers, ...leftNumbers]
  need(new Set(all).size === all.length, 'a number stands twice')
}

function isInOrder(numbers: readonly string[]): boolean {
  return numbers.every((number, i) => i === 0 || byEntryNumber(numbers[i - 1] ?? '', number) <= 0)
}

/** Names and dates: the crate, and the top folder with its scope and day. */
export function checkNamesAndDates(c: Case): void {
  c.report.check('crate', dataPath.crate, () => checkCrate(c, parseJson(c.read(dataPath.crate))))
  c.report.check('top folder', c.topFolder, () => checkTopFolder(c))
}

interface Crate {
  '@context'?: unknown
  '@graph': ({
    '@id': string
    '@type': string | string[]
    about?: { '@id': string }
    datePublished?: string
  } & Record<string, unknown>)[]
}

/** RO-Crate: root data set, no entity twice, every file named is there, and no digests (the manifests give them). */
function checkCrate(c: Case, value: unknown): void {
  const crate = value as Crate
  const graph = new Map(crate['@graph'].map((entity) => [entity['@id'], entity]))
  need(graph.size === crate['@graph'].length && crate['@context'] !== undefined, 'no crate')
  const root = graph.get('./')
  need(graph.get('ro-crate-metadata.json')?.about?.['@id'] === './' && root !== undefined, 'no root data set')
  const published = present(root.datePublished, 'no datePublished')
  need(published.slice(0, 10) === c.head.time.slice(0, 10), 'datePublished is not that of the head')
  for (const [id, entity] of graph) {
    const members = Object.keys(entity).map((member) => member.toLowerCase())
    need(!members.some((member) => ['sha256', 'sha512', 'md5'].includes(member)), 'the crate gives digests')
    const isFile = entity['@type'].includes('File') && !/^(?:[a-z]+:|#)/.test(id)
    need(!isFile || c.paths.has(`data/${decodeURIComponent(id)}`), `names an absent file: ${id}`)
  }
}

function checkTopFolder(c: Case): void {
  const day = c.head.time.slice(0, 10)
  const form = /^[a-z0-9]+(?:-[a-z0-9]+)*?-(N-\d+-\d+|N-\d+|selection)-(\d{4}-\d\d-\d\d)$/
  const [, scope, date] = form.exec(c.topFolder) ?? []
  need(scope !== undefined, 'not `<laboratory slug>-<N-07 | N-07-042 | selection>-<date>`')
  need(date === day && c.baggingDates.every((other) => other === day), 'dates are not that of the head')
  const numbers = c.bundle.entries.map((entry) => entry.number)
  const hyphens = scope.split('-').length - 1
  if (hyphens === 2)
    need(numbers.map(entryFolderName).includes(scope), 'the entry of the name is not in the bundle')
  if (hyphens === 1) checkNotebook(c, scope, numbers)
}

/** A notebook bundle names every number from 1 to its highest, and leaves out only what is not sealed. */
function checkNotebook(c: Case, notebook: string, there: readonly string[]): void {
  const unsealedOnly = c.bundle.leftOut.every((item) => item.kind !== 'entry' || item.reason === 'not-sealed')
  need(unsealedOnly, 'leaves out an entry for another reason than not-sealed')
  const numbers = [...there, ...c.leftOutNumbers().values()]
  need(
    numbers.every((number) => number.startsWith(`${notebook}/`)),
    'entry of another notebook',
  )
  const have = new Set(numbers.map((number) => entryOrder(number)[1] ?? 0))
  const highest = Math.max(...have)
  for (let n = 1; n <= highest; n++) need(have.has(n), `gap in the numbers of the notebook: ${n}`)
}

/** Shapes 2, "State": what an addendum exported alone amends was not chosen; all else that is left out is not sealed. */
export function checkLeftOut(c: Case): void {
  const amended = new Map(
    [...c.entries.values()].flatMap((entry) => {
      const amends = entry.record?.entry.amends
      return amends ? [[amends.entryId, amends.number] as const] : []
    }),
  )
  for (const item of c.bundle.leftOut) {
    if (item.kind !== 'entry') continue
    c.report.check('left out', dataPath.description, () => {
      const reason = amended.has(item.id) ? 'not-chosen' : 'not-sealed'
      need(item.reason === reason, `${item.number} cannot be left out as ${item.reason}`)
      const number = amended.get(item.id) ?? item.number
      need(number === item.number, `${item.number} has another number where it is amended`)
    })
    c.report.remark('left out', item.id, `entry ${item.number} left out: ${item.reason}`)
  }
}

/** Shapes 2, "Strict": whatever no other check called for. */
export function checkLayout(c: Case): void {
  for (const path of [...c.paths].filter((candidate) => !c.called.has(candidate)).sort()) {
    c.report.add('layout', path, false, 'a file the layout does not call for')
  }
}
