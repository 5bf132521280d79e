import type { Json } from '../canonical-json.ts'
import type { Digester } from '../digest.ts'
import { readArchive } from './archive.ts'
import { Case } from './case.ts'
import { checkAuthorities, checkOwnAnchors } from './check-authorities.ts'
import { checkBag, checkBagSignature } from './check-bag.ts'
import { checkDescription, checkLayout, checkLeftOut, checkNamesAndDates } from './check-description.ts'
import { checkEntry, checkState, readEntry } from './check-entry.ts'
import { checkLedgerTimes } from './check-events.ts'
import { checkHead, checkLedgerKeys } from './check-head.ts'
import { checkKeys, checkUsedKeys } from './check-keys.ts'
import { checkRawLists } from './check-raw.ts'
import { compareAnchors, compareHead, type AnchorsState } from './compare-outside.ts'
import { entryFolder } from '../bundle/layout.ts'
import { Report, type Check, type Verdict } from './report.ts'
import { isSelfIssued, oid, readRevocationList } from './x509.ts'
import type { BundleSource } from './zip-directory.ts'

export type { BundleSource } from './zip-directory.ts'
export type { Check, Verdict } from './report.ts'
export type { AnchorsState } from './compare-outside.ts'
export { reportText } from './cli-text.ts'

export interface VerifyOptions {
  /** Parsed JSON of the anchors given apart from the bundle. */
  anchors?: Json
  /** Parsed JSON of `GET /ledger/head`. */
  head?: Json
  /** Parsed JSON of `GET /ledger/consistency`. */
  consistency?: Json
  /** PEM of a later revocation list. */
  crl?: Uint8Array
  /** A faster SHA-2 than the pure one, where the platform has it. */
  digester?: Digester
}

/** What a person compares by eye when no anchors were given. */
export interface OwnDigests {
  laboratory: string
  caSha256: string
  ledgerKeysSha256: string[]
  rootEnrolmentSha256: string
  tsaRootsSha256: string[]
}

export interface VerifyReport {
  verdict: Verdict
  anchors: AnchorsState
  checks: Check[]
  /** Not part of the JSON answer: for people. Null where the bundle's own files could not be read. */
  about: {
    topFolder: string
    digests: OwnDigests | null
    timeStampAuthority: string | null
    entries: string[]
  }
}

/**
 * Runs all checks of a bundle (shapes 1, 2) and names every failing path. Never throws for damaged input: what cannot be read
 * fails its check.
 */
export async function verifyBundle(source: BundleSource, options: VerifyOptions = {}): Promise<VerifyReport> {
  const report = new Report()
  const archive = await readArchive(source, report, options.digester)
  if (!archive) {
    report.add('bundle', 'bundle.zip', false, 'not a zip that can be read')
    return answer(report, 'not-given', null)
  }
  const c = new Case(report, archive)
  checkWhole(c)
  if (options.crl) {
    const { crl } = options
    report.check('revocation list given', '--crl', () => {
      c.laterCrl = readRevocationList(crl, c.ca)
    })
  }
  checkEntries(c)
  for (const [name, step] of lastSteps) report.check(name, 'data/', () => step(c))
  checkLayout(c)
  const anchors = options.anchors === undefined ? 'not-given' : compareAnchors(c, options.anchors)
  if (options.head !== undefined) compareHead(c, options.head, options.consistency)
  return answer(report, anchors, c)
}

const firstSteps: [name: string, step: (c: Case) => void][] = [
  ['bag', checkBag],
  ['description', checkDescription],
  ['anchors', checkOwnAnchors],
  ['authorities', checkAuthorities],
  ['ledger keys', checkLedgerKeys],
  ['head', checkHead],
  ['bag signature', checkBagSignature],
  ['names and dates', checkNamesAndDates],
  ['keys', checkKeys],
]

const lastSteps: [name: string, step: (c: Case) => void][] = [
  ['ledger times', checkLedgerTimes],
  ['raw lists', checkRawLists],
  ['left out', checkLeftOut],
  ['used keys', checkUsedKeys],
  ['state', checkState],
]

function checkWhole(c: Case): void {
  for (const [name, step] of firstSteps) c.report.check(name, 'data/', () => step(c))
}

function checkEntries(c: Case): void {
  for (const work of [readEntry, checkEntry]) {
    c.report.check('entries', 'data/bundle.json', () => {
      for (const place of c.bundle.entries)
        c.report.check('entry', entryFolder(place.number), () => work(c, place))
    })
  }
}

function answer(report: Report, anchors: AnchorsState, c: Case | null): VerifyReport {
  return {
    verdict: report.verdict(),
    anchors,
    checks: report.checks,
    about: {
      topFolder: c?.topFolder ?? '',
      digests: readable(() => c && ownDigests(c)),
      timeStampAuthority: readable(() => c && timeStampSentence(c)),
      entries: readable(() => c?.bundle.entries.map((entry) => entry.number)) ?? [],
    },
  }
}

/** Null where damaged parts cannot be read; the checks have said so already. */
function readable<T>(read: () => T | null | undefined): T | null {
  try {
    return read() ?? null
  } catch {
    return null
  }
}

function ownDigests(c: Case): OwnDigests {
  const { laboratory, caSha256, ledgerKeysSha256, rootEnrolmentSha256, tsaRootsSha256 } = c.anchors
  return { laboratory, caSha256, ledgerKeysSha256, rootEnrolmentSha256, tsaRootsSha256 }
}

/** How the names of the authority that the product itself brings begin (server/fakes). */
const builtInAuthority = 'Local time-stamp'

/** Says who stamped, and plainly when that is the laboratory itself: then the certificate has its name, or the built-in one. */
function timeStampSentence(c: Case): string {
  const roots = c.tsaChain.filter(isSelfIssued)
  const names = roots.map((root) =>
    [...root.subjectValues(oid.commonName), ...root.subjectValues(oid.organization)].join(', '),
  )
  const laboratory = [...c.entries.values()][0]?.record?.laboratory.name
  const isOwn = (name: string) =>
    name.startsWith(builtInAuthority) || (laboratory !== undefined && name.includes(laboratory))
  const own = names.some(isOwn)
  return own
    ? `Time stamps: by the laboratory’s own authority (${names.join('; ')}). They prove nothing to outsiders.`
    : `Time stamps: by ${names.join('; ')}. If the laboratory runs that authority itself, its stamps prove nothing to outsiders.`
}

/** Exit code of the command line: 0 holds, 1 broken, 3 incomplete (2 is usage). */
export const exitCodes = { holds: 0, broken: 1, incomplete: 3 } as const
