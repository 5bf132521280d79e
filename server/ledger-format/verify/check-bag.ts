import { bagDeclaration, bagSignaturePath, manifestNames, tagFiles } from '../bundle/layout.ts'
import { utf8Text } from '../utf8.ts'
import type { Case } from './case.ts'
import { need } from './report.ts'
import { checkSigned } from './signed-by.ts'

const tagManifests = ['tagmanifest-sha256.txt', 'tagmanifest-sha512.txt'] as const

/** BagIt 1.0 (RFC 8493), stricter: one declaration, both manifests complete and in order, tag manifests of exactly four files. */
export function checkBag(c: Case): void {
  for (const name of [...tagFiles, ...tagManifests, bagSignaturePath])
    c.report.check('bag file', name, () => c.read(name))
  c.report.check('bag declaration', 'bagit.txt', () => {
    need(utf8Text(c.read('bagit.txt')) === bagDeclaration, 'not the two lines of BagIt 1.0')
  })
  c.report.check('bag info', 'bag-info.txt', () => checkBagInfo(c))
  const payload = [...c.paths].filter((path) => path.startsWith('data/'))
  checkManifest(c, manifestNames[0], 'sha256', payload)
  checkManifest(c, tagManifests[0], 'sha256', [...tagFiles])
  checkManifest(c, manifestNames[1], 'sha512', payload)
  checkManifest(c, tagManifests[1], 'sha512', [...tagFiles])
}

function checkBagInfo(c: Case): void {
  const lines = utf8Text(c.read('bag-info.txt')).replace(/\n$/, '').split('\n')
  const wellFormed = lines.every((line) => /^(?:[^\s:][^:\r]*: \S[^\r]*|[ \t]+\S[^\r]*)$/.test(line))
  need(wellFormed, 'a line is not `label: value`')
  const values = (label: string) =>
    lines
      .filter((line) => line.toLowerCase().startsWith(`${label}: `))
      .map((line) => line.slice(label.length + 2))
  const identifiers = values('external-identifier')
  need(
    identifiers.length === 1 && identifiers[0] === c.topFolder,
    'External-Identifier is not the top folder',
  )
  const oxum = values('payload-oxum')
  if (oxum.length > 0) {
    const payload = [...c.files].filter(([path]) => path.startsWith('data/'))
    const bytes = payload.reduce((sum, [, file]) => sum + file.size, 0)
    need(oxum.length === 1 && oxum[0] === `${bytes}.${payload.length}`, 'Payload-Oxum differs')
  }
  c.baggingDates = values('bagging-date')
}

/** Lines `<hex>  <path>` in order of the paths' bytes; exactly the files that must be listed; every digest. */
function checkManifest(
  c: Case,
  name: string,
  algorithm: 'sha256' | 'sha512',
  listed: readonly string[],
): void {
  const lines = new Map<string, string>()
  c.report.check('manifest', name, () => readManifest(c.read(name), algorithm, lines))
  const mustBe = new Set(listed)
  for (const path of [...new Set([...listed, ...lines.keys()])].sort()) {
    c.report.check(name, path, () => {
      need(c.paths.has(path), 'listed, but absent')
      need(mustBe.has(path), 'may not be listed here')
      need(lines.has(path), 'not listed')
      need(c.file(path)[algorithm] === lines.get(path), 'digest differs')
    })
  }
}

function readManifest(bytes: Uint8Array, algorithm: 'sha256' | 'sha512', lines: Map<string, string>): void {
  const text = utf8Text(bytes)
  need(text.endsWith('\n'), 'last line has no end')
  const form = algorithm === 'sha256' ? /^([0-9a-f]{64}) {2}([^\r%]+)$/ : /^([0-9a-f]{128}) {2}([^\r%]+)$/
  for (const line of text.slice(0, -1).split('\n')) {
    const [, digest, path] = form.exec(line) ?? []
    need(digest !== undefined && path !== undefined, `line is not \`<hex>  <path>\`: ${line.slice(0, 80)}`)
    need(!lines.has(path), `listed twice: ${path}`)
    lines.set(path, digest)
  }
  const paths = [...lines.keys()]
  need(
    paths.every((path, i) => i === 0 || inByteOrder(paths[i - 1] ?? '', path)),
    'lines are not in order',
  )
}

/** Order of UTF-8 bytes, which is that of code points. */
function inByteOrder(a: string, b: string): boolean {
  const [x, y] = [[...a], [...b]]
  const at = x.findIndex((character, i) => character !== y[i])
  if (at < 0) return true
  return (x[at]?.codePointAt(0) ?? 0) < (y[at]?.codePointAt(0) ?? -1)
}

/** The one signature over all: by the ledger key in force at export, over the bytes of tagmanifest-sha256.txt. */
export function checkBagSignature(c: Case): void {
  c.report.check('bag signature', bagSignaturePath, () => {
    const current = c.keyChain().at(-1) ?? ''
    need(c.bundle.bagKeySha256 === current, 'not by the ledger key in force at export')
    checkSigned(c.ledgerKey(current), c.read('tagmanifest-sha256.txt'), c.read(bagSignaturePath))
  })
}
