import { dataPath, rawName } from '../bundle/layout.ts'
import type { SignedRecord } from '../record.ts'
import type { Case } from './case.ts'
import { Missing, need, present } from './report.ts'

/** raw/: each file of the record under its name, with its digest and size, or named in leftOut. */
export function checkRawFiles(c: Case, folder: string, record: SignedRecord): void {
  const stored = new Map(c.bundle.raw.map((item) => [item.fileId, item]))
  const names = record.files.map((file) => file.name)
  const leftOut = c.leftOut('raw')
  for (const file of record.files) {
    c.report.check('raw file', `${folder}raw/${file.name}`, () => {
      const item = stored.get(file.id)
      if (!item) {
        need(leftOut.has(file.id), 'neither in raw nor in leftOut of bundle.json')
        throw new Missing('left out by choice')
      }
      const path = `data/${item.path}`
      need(
        path === `${folder}raw/${rawName(file, names)}`,
        `stored in data/bundle.json as ${item.path}, which is not its name`,
      )
      need(c.call(path), `${path} of data/bundle.json is absent`)
      const { sha256, size } = c.file(path)
      const right =
        sha256 === file.sha256 &&
        sha256 === item.sha256 &&
        String(size) === file.size &&
        file.size === item.size
      need(right, `${path} has another digest or size than the record and data/bundle.json say`)
      need(!leftOut.has(file.id), 'both in raw and left out')
    })
  }
}

/** Both lists of raw files in bundle.json: files of these entries, in order of entry number, then fileId. */
export function checkRawLists(c: Case): void {
  c.report.check('raw list', dataPath.description, () => {
    const order = c.bundle.entries.flatMap(({ entryId, folder }) => {
      const record = present(c.entries.get(entryId)?.record, `the record of ${folder} could not be read`)
      return record.files.map((file) => file.id).sort()
    })
    const left = c.bundle.leftOut.filter((item) => item.kind === 'raw').map((item) => item.id)
    for (const ids of [c.bundle.raw.map((item) => item.fileId), left]) {
      const due = order.filter((id) => ids.includes(id))
      need(ids.join() === due.join(), 'not files of these entries in order of number and fileId')
    }
  })
}
