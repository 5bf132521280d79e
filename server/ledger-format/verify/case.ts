import type { Anchors } from '../anchors.ts'
import type { BundleDescription } from '../bundle/description.ts'
import { present, need, type Report } from './report.ts'
import type { Archive, ArchiveFile } from './archive.ts'
import type { Head } from '../head.ts'
import type { RotationStatement } from '../rotation.ts'
import type { Certificate, RevocationList } from './x509.ts'
import type { VerifiedEvent } from './check-events.ts'
import type { VerifiedKey } from './check-keys.ts'
import type { VerifiedEntry } from './check-entry.ts'

/**
 * What is known while a bundle is checked. Members are filled by the checks in turn; damaged parts stay null, and whoever
 * needs them fails with the path of what is damaged.
 */
export class Case {
  readonly report: Report
  readonly topFolder: string
  /** Files by path relative to the top folder. */
  readonly files: ReadonlyMap<string, ArchiveFile>
  readonly paths: ReadonlySet<string>
  /** Paths that the layout calls for; all others are refused at the end. */
  readonly called = new Set<string>()

  private description: BundleDescription | null = null
  private knownHead: Head | null = null
  private knownAnchors: Anchors | null = null
  private authority: Certificate | null = null

  crl: RevocationList | null = null
  laterCrl: RevocationList | null = null
  tsaChain: Certificate[] = []
  /** Raw public keys by SHA-256 of their SPKI. */
  readonly ledgerKeys = new Map<string, Uint8Array>()
  readonly rotations: RotationStatement[] = []
  readonly events = new Map<number, VerifiedEvent>()
  /** Chains by `kind id` of their subject. */
  readonly chains = new Map<string, VerifiedEvent[]>()
  /** Keys by SHA-256 of their enrolment. */
  readonly keys = new Map<string, VerifiedKey>()
  /** Entries by id. */
  readonly entries = new Map<string, VerifiedEntry>()
  baggingDates: string[] = []

  constructor(report: Report, archive: Archive) {
    this.report = report
    this.topFolder = archive.topFolder
    this.files = archive.files
    this.paths = archive.paths
  }

  get bundle(): BundleDescription {
    return present(this.description, 'bundle.json could not be read')
  }

  set bundle(value: BundleDescription) {
    this.description = value
  }

  get head(): Head {
    return present(this.knownHead, 'head.json could not be read')
  }

  set head(value: Head) {
    this.knownHead = value
  }

  get anchors(): Anchors {
    return present(this.knownAnchors, 'anchors.json could not be read')
  }

  set anchors(value: Anchors) {
    this.knownAnchors = value
  }

  get ca(): Certificate {
    return present(this.authority, 'ca.pem could not be read')
  }

  set ca(value: Certificate) {
    this.authority = value
  }

  /** The digest of the root enrolment, if anchors.json tells it. */
  get rootEnrolment(): string | undefined {
    return this.knownAnchors?.rootEnrolmentSha256
  }

  /** Says that the layout calls for a path; answers whether it is there. */
  call(path: string): boolean {
    this.called.add(path)
    return this.paths.has(path)
  }

  /** Bytes of a file that must be there. @throws Wrong when it is absent, damaged, or too large for its kind. */
  read(path: string): Uint8Array {
    need(this.call(path), 'file is absent')
    return present(this.file(path).bytes, 'too large for this kind of file')
  }

  file(path: string): ArchiveFile {
    return present(this.files.get(path), 'file is absent or damaged')
  }

  /** Names of the folders directly under a path, sorted. */
  folders(under: string): string[] {
    const names = new Set<string>()
    for (const path of this.paths) {
      const rest = path.startsWith(under) ? path.slice(under.length) : ''
      if (rest.includes('/')) names.add(rest.slice(0, rest.indexOf('/')))
    }
    return [...names].sort()
  }

  /** Ids that bundle.json says are left out. */
  leftOut(kind: 'entry' | 'raw'): Set<string> {
    return new Set(this.bundle.leftOut.filter((item) => item.kind === kind).map((item) => item.id))
  }

  /** Numbers of the entries left out, by id. */
  leftOutNumbers(): Map<string, string> {
    return new Map(
      this.bundle.leftOut.flatMap((item) => (item.kind === 'entry' ? [[item.id, item.number]] : [])),
    )
  }

  /** SHA-256 of the ledger keys in order, as the rotations tell. */
  keyChain(): string[] {
    const first = present(this.anchors.ledgerKeysSha256[0], 'anchors.json names no ledger key')
    return [first, ...this.rotations.map((statement) => statement.to)]
  }

  ledgerKey(keySha256: string): Uint8Array {
    return present(this.ledgerKeys.get(keySha256), `ledger key ${keySha256} is not in the bundle`)
  }
}
