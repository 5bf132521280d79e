import { PDFDocument } from 'pdf-lib'
import { figureText, shownText } from '../../../server/contract/quantity-text.ts'
import {
  buildBundle,
  reachedKeys,
  renderedPayload,
  type Bundle,
  type BundleInput,
  type KeyInput,
  type SignatureInput,
} from '../../../server/ledger-format/bundle/index.ts'
import {
  buildAnchors,
  buildBody,
  buildEndorsement,
  buildEnrolment,
  buildEvent,
  buildHead,
  buildRecord,
  buildRotationStatement,
  contentSha256,
  endorsementBytes,
  endorsementStatement,
  enrolmentBytes,
  enrolmentStatement,
  fromHex,
  headBytes,
  MerkleTree,
  noPrevious,
  publicKeyOf,
  readingSha256,
  rotationStatementBytes,
  sha256Hex,
  sha512Hex,
  signMessage,
  signingStatement,
  spkiOf,
  toBase64,
  toHex,
  utf8Bytes,
  type BuiltBody,
  type BuiltEvent,
  type BuiltRecord,
  type Head,
  type KnownAction,
  type LedgerEvent,
  type Meaning,
  type PayloadOf,
  type RecordBody,
  type Rotation,
  type Signing,
} from '../../../server/ledger-format/index.ts'
import { CertificateAuthority, TimeStampAuthority, type IssuedCertificate } from './authorities.ts'

type Subject = LedgerEvent['subject']
const name = 'Ridgeway Photonics Laboratory'
const people = {
  bram: { name: 'Bram', role: 'manager' },
  farid: { name: 'Dr Farid Shirvani', role: 'supervisor' },
  maren: { name: 'Maren Adeyemi', role: 'experimentalist' },
} as const
export type Who = keyof typeof people

/** Ids and keys come from names, so that every run of the tests has the same ones. */
const hash = (text: string) => sha256Hex(utf8Bytes(text))
export const idOf = (text: string) =>
  hash(text).replace(/^(.{8})(.{4}).(.{3}).(.{3})(.{12}).*$/, '$1-$2-4$3-8$4-$5')
const seedOf = (text: string) => fromHex(hash(`key ${text}`))

interface Key {
  who: Who
  seed: Uint8Array
  input: KeyInput
  enrolmentSha256: string
  subject: Subject
  certificate: IssuedCertificate | null
}

interface Signature extends SignatureInput {
  record: Uint8Array
  built: BuiltRecord
  key: Key
  signatureSha256: string
}

interface Entry {
  id: string
  number: string
  amends: Entry | null
  subject: Subject
  revisions: number
  written: string[]
  content: { type: string; content: object[] }
  runs: RecordBody['runs']
  files: RecordBody['files']
  bytes: Map<string, Uint8Array>
  calculations: RecordBody['calculations']
  results: Map<string, Uint8Array>
  returns: RecordBody['history']['returns']
  living: Signature[]
  voided: (Signature & { time: string })[]
  body: BuiltBody | null
  rendered: { name: string; bytes: Uint8Array }[]
}

const paragraph = (text: string) => ({
  type: 'paragraph',
  attrs: { id: hash(text).slice(0, 8) },
  content: [{ type: 'text', text }],
})

/**
 * An invented laboratory run forward through the ledger format's own builders: keys enrolled and endorsed, an entry with a run, a file
 * and a quoted calculation that is signed, returned, signed again, witnessed and sealed, a new ledger key, and an addendum.
 */
export class SampleLaboratory {
  readonly id = idOf('laboratory')
  readonly events: BuiltEvent[] = []
  readonly heads: { head: Head; signature: Uint8Array; timeStamp: Uint8Array }[] = []
  readonly entries: Entry[] = []
  readonly ledgerSeeds = [seedOf('ledger 1')]
  private readonly rotations: Rotation[] = []
  private readonly keys = new Map<Who, Key>()
  private clock = Date.parse('2026-03-02T09:00:00.000Z')
  private ca!: CertificateAuthority
  private tsa!: TimeStampAuthority
  private readonly notebook = { id: idOf('notebook'), number: 'N-07', title: 'Pair source' }

  /** @param salt other text gives other people's keys, ledger keys and authorities to the same story. */
  private constructor(private readonly salt: string) {
    this.ledgerSeeds = [seedOf(`ledger 1${salt}`)]
  }

  static async open(salt = ''): Promise<SampleLaboratory> {
    const laboratory = new SampleLaboratory(salt)
    const start = new Date('2026-03-01T00:00:00.000Z')
    laboratory.ca = await CertificateAuthority.open(seedOf(`ca${salt}`), `${name} CA`, start)
    laboratory.tsa = await TimeStampAuthority.open(`${name} time stamps`, start)
    await laboratory.story()
    return laboratory
  }

  private now(seconds = 1): string {
    this.clock += seconds * 1000
    return new Date(this.clock).toISOString()
  }

  private async story(): Promise<void> {
    this.event(
      'laboratory.opened',
      { kind: 'laboratory', id: this.id },
      {
        laboratory: this.id,
        demo: true,
        caSha256: this.ca.root.sha256,
        ledgerKeySha256: this.ledgerKey(),
        tsaRootSha256: this.tsa.root.sha256,
      },
    )
    await this.enrol('bram', null)
    await this.enrol('farid', 'bram')
    await this.enrol('maren', 'farid')
    const first = this.create('N-07/001', null)
    this.measure(first)
    this.revise(first, [
      paragraph('Second order correlation of the pair source.'),
      this.block(first),
      this.quote(first),
    ])
    await this.sign(first, 'maren', 'authorship')
    this.giveBack(first, 'Say which filter was in.')
    this.revise(first, [paragraph('Filter: 810 nm, 3 nm wide.')])
    await this.sign(first, 'maren', 'authorship')
    await this.sign(first, 'farid', 'witness-present')
    await this.seal(first)
    this.rotate()
    const addendum = this.create('N-07/002', first)
    this.revise(addendum, [paragraph('The window was 2 ns, not 3 ns.')])
    await this.sign(addendum, 'maren', 'authorship')
    await this.sign(addendum, 'farid', 'witness-read')
    await this.seal(addendum)
  }

  // ----- ledger

  private ledgerKey(): string {
    return sha256Hex(spkiOf(publicKeyOf(this.ledgerSeeds.at(-1)!)))
  }

  event<A extends KnownAction>(
    action: A,
    subject: Subject,
    payload: PayloadOf<A>,
    who: Who | 'system' = 'system',
  ): BuiltEvent {
    const chain = this.events.filter(({ event }) => event.subject.id === subject.id)
    const built = buildEvent({
      epoch: 1,
      sequence: this.events.length + 1,
      time: this.now(),
      actor:
        who === 'system'
          ? { kind: 'system', id: null, onBehalfOf: null }
          : { kind: 'person', id: idOf(who), onBehalfOf: null },
      action,
      subject,
      subjectSequence: chain.length + 1,
      subjectPrevious: chain.at(-1)?.digest ?? null,
      payload: payload as LedgerEvent['payload'],
      previous: this.events.at(-1)?.digest ?? noPrevious,
    })
    this.events.push(built)
    return built
  }

  tree(): MerkleTree {
    return new MerkleTree(this.events.map((event) => fromHex(event.leafHash)))
  }

  private async head(): Promise<void> {
    const last = this.heads.at(-1)?.head
    const head = buildHead({
      laboratory: this.id,
      epoch: 1,
      treeSize: this.events.length,
      rootHash: toHex(this.tree().root()),
      lastDigest: this.events.at(-1)!.digest,
      time: new Date(this.clock).toISOString(),
      previous: last ? { treeSize: last.treeSize, rootHash: last.rootHash } : null,
      keySha256: this.ledgerKey(),
    })
    const signature = signMessage(this.ledgerSeeds.at(-1)!, headBytes(head))
    this.heads.push({ head, signature, timeStamp: await this.tsa.stamp(signature, new Date(this.clock)) })
  }

  private rotate(): void {
    const [old, fresh] = [this.ledgerSeeds.at(-1)!, seedOf(`ledger 2${this.salt}`)]
    const statement = buildRotationStatement({
      laboratory: this.id,
      from: this.ledgerKey(),
      newPublicKey: publicKeyOf(fresh),
      time: this.now(),
    })
    const bytes = rotationStatementBytes(statement)
    this.event(
      'ledger.key-rotated',
      { kind: 'laboratory', id: this.id },
      { from: statement.from, to: statement.to, statementSha256: sha256Hex(bytes) },
    )
    this.rotations.push({
      statement,
      signatureFrom: toBase64(signMessage(old, bytes)),
      signatureTo: toBase64(signMessage(fresh, bytes)),
    })
    this.ledgerSeeds.push(fresh)
  }

  // ----- keys

  private async enrol(who: Who, endorser: Who | null): Promise<void> {
    const seed = seedOf(who + this.salt)
    const enrolment = buildEnrolment({
      laboratory: this.id,
      id: idOf(`enrolment ${who}`),
      subjectId: idOf(who),
      name: people[who].name,
      publicKey: publicKeyOf(seed),
      supersedes: null,
      policyVersion: '1',
      statement: enrolmentStatement({ name: people[who].name, laboratory: name }),
      time: this.now(),
    })
    const bytes = enrolmentBytes(enrolment)
    const enrolmentSha256 = sha256Hex(bytes)
    const subject: Subject = { kind: 'key', id: enrolment.id }
    const input: KeyInput = {
      enrolment: bytes,
      enrolmentSignature: signMessage(seed, bytes),
      endorsement: null,
      events: [],
    }
    const key: Key = { who, seed, input, enrolmentSha256, subject, certificate: null }
    this.keys.set(who, key)
    this.event(
      endorser ? 'key.enrolled' : 'key.root-enrolled',
      subject,
      { subjectId: idOf(who), enrolmentSha256, supersedes: null },
      who,
    )
    if (endorser) this.endorse(key, endorser)
    key.certificate = await this.ca.certify({
      name: people[who].name,
      subjectId: idOf(who),
      seed,
      serial: `10${hash(who).slice(0, 8)}`,
    })
    const { sha256: certificateSha256, notAfter } = key.certificate
    this.event('key.certified', subject, { enrolmentSha256, certificateSha256, notAfter })
  }

  private endorse(key: Key, by: Who): void {
    const endorser = this.keys.get(by)!
    const document = endorsementBytes(
      buildEndorsement({
        laboratory: this.id,
        id: idOf(`endorsement ${key.who}`),
        enrolmentSha256: key.enrolmentSha256,
        subjectId: idOf(key.who),
        publicKey: toBase64(publicKeyOf(key.seed)),
        endorser: {
          subjectId: idOf(by),
          name: people[by].name,
          role: by === 'bram' ? 'manager' : 'supervisor',
          enrolmentSha256: endorser.enrolmentSha256,
        },
        identity: 'Seen in person, staff card compared.',
        statement: endorsementStatement({
          endorser: people[by].name,
          person: people[key.who].name,
          laboratory: name,
          keyDigits: key.enrolmentSha256.slice(0, 16),
        }),
        time: this.now(),
      }),
    )
    key.input.endorsement = { document, signature: signMessage(endorser.seed, document) }
    this.event(
      'key.endorsed',
      key.subject,
      { enrolmentSha256: key.enrolmentSha256, endorsementSha256: sha256Hex(document) },
      by,
    )
  }

  // ----- an entry's life

  private create(number: string, amends: Entry | null): Entry {
    const id = idOf(`entry ${number}`)
    const entry: Entry = {
      id,
      number,
      amends,
      subject: { kind: 'entry', id },
      revisions: 0,
      written: [],
      content: { type: 'doc', content: [] },
      runs: [],
      files: [],
      bytes: new Map(),
      calculations: [],
      results: new Map(),
      returns: [],
      living: [],
      voided: [],
      body: null,
      rendered: [],
    }
    this.entries.push(entry)
    this.event('entry.created', entry.subject, { notebookId: this.notebook.id, number }, 'maren')
    return entry
  }

  /** A run with a file read and computed, and a file with a name that no disk should have to bear. */
  private measure(entry: Entry): void {
    const run: Subject = { kind: 'run', id: idOf('run 12') }
    const startedAt = this.now()
    const reading = { format: 'delimited', version: 1, options: { separator: ',' } }
    const file = this.store(
      run,
      'heralded.csv',
      utf8Bytes('channel,time\n0,12\n1,5012\n'.repeat(50)),
      run.id,
      { ...reading, sha256: readingSha256(reading) },
    )
    const runEvents = this.events.filter(({ event }) => event.subject.id === run.id)
    this.event(
      'entry.run-filed',
      entry.subject,
      { runId: run.id, runSubjectSequence: runEvents.length, runDigest: runEvents.at(-1)!.digest },
      'maren',
    )
    entry.runs.push({
      id: run.id,
      number: 'R-0012',
      experiment: 'heralded',
      startedAt,
      durationPs: '60000000000000',
      conditions: [{ name: 'temperature', value: '4.20', u: '0.10', unit: 'K' }],
      apparatus: [
        {
          id: idOf('detector'),
          version: 2,
          kind: 'detector',
          name: 'D1 Heron',
          role: 'A',
          channel: 0,
          figures: [{ name: 'efficiency', value: '0.65', u: '0.02', unit: '1', calibrationId: null }],
        },
      ],
      cautions: [{ code: 'laser', acknowledgedBy: idOf('maren'), time: startedAt }],
    })
    const sketch = this.store(
      entry.subject,
      'Skizze (1) Aufbau → D1.txt',
      utf8Bytes('Beam path to D1\n'),
      null,
      null,
    )
    for (const { record, bytes } of [file, sketch]) {
      entry.files.push(record)
      entry.bytes.set(record.id, bytes)
    }
    this.compute(entry, file.record)
  }

  private store(
    subject: Subject,
    fileName: string,
    bytes: Uint8Array,
    runId: string | null,
    reading: RecordBody['files'][number]['reading'],
  ) {
    const record: RecordBody['files'][number] = {
      id: idOf(`file ${fileName}`),
      runId,
      name: fileName,
      size: String(bytes.length),
      sha256: sha256Hex(bytes),
      uploadedBy: idOf('maren'),
      uploadedAt: this.now(),
      via: 'browser',
      reading,
    }
    this.event(
      'file.stored',
      subject,
      { fileId: record.id, sha256: record.sha256, size: record.size },
      'maren',
    )
    if (reading)
      this.event('reading.set', subject, { fileId: record.id, readingSha256: reading.sha256 }, 'maren')
    return { record, bytes }
  }

  private compute(entry: Entry, file: RecordBody['files'][number]): void {
    // Values of definitions.md, rows 15 and 16.
    const result = {
      heralds: 100000,
      g2: { value: 0.02, u: 0.00257218972862, unit: '1' },
      efficiencyA: { value: 0.2, u: 0.00126491106407, unit: '1' },
      efficiencyB: { value: null, u: null, unit: '1' },
    }
    const bytes = utf8Bytes(JSON.stringify(result))
    const figures = (['g2', 'efficiencyA'] as const).map((member) => ({
      pointer: `/${member}`,
      label: member === 'g2' ? 'heralded g2(0)' : 'eta_A',
      ...figureText(result[member].value, result[member].u),
      unit: '1',
    }))
    const calculation: RecordBody['calculations'][number] = {
      id: idOf('calculation 1'),
      label: 'C1',
      kind: 'heralded',
      version: 1,
      engine: '1.0.0',
      parameters: { herald: 0, a: 1, b: 2, windowAPs: 2000 },
      inputs: [
        { fileId: file.id, sha256: file.sha256, readingSha256: file.reading!.sha256, homeEntry: null },
      ],
      resultSha256: sha256Hex(bytes),
      finishedAt: this.now(),
      figures,
      notes: [{ code: 'few-pairs', detail: null, answer: null }],
    }
    entry.calculations.push(calculation)
    entry.results.set('C1', bytes)
    const { id: calculationId, kind, version, engine, resultSha256 } = calculation
    this.event('calculation.finished', entry.subject, { calculationId, kind, version, engine, resultSha256 })
  }

  private block(entry: Entry): object {
    return { type: 'calculation', attrs: { id: 'c1', calculationId: entry.calculations[0]!.id } }
  }

  private quote(entry: Entry): object {
    const quoted = {
      type: 'quotedResult',
      attrs: { id: 'q1', calculationId: entry.calculations[0]!.id, pointer: '/g2' },
    }
    return {
      type: 'paragraph',
      attrs: { id: 'p2' },
      content: [{ type: 'text', text: 'We find g2(0) = ' }, quoted],
    }
  }

  private revise(entry: Entry, more: object[]): void {
    entry.content = { ...entry.content, content: [...entry.content.content, ...more] }
    entry.revisions += 1
    entry.written.push(this.now())
    this.event(
      'entry.revised',
      entry.subject,
      { revision: entry.revisions, contentSha256: contentSha256(entry.content), cause: 'pause' },
      'maren',
    )
  }

  private bodyOf(entry: Entry): BuiltBody {
    const amended = entry.amends?.living[0]?.built.record
    const hasRun = entry.runs.length > 0
    return buildBody({
      laboratory: { id: this.id, name, demo: true },
      notebook: this.notebook,
      entry: {
        id: entry.id,
        number: entry.number,
        title: `Entry ${entry.number}`,
        experiment: 'heralded',
        revision: entry.revisions,
        workDate: '2026-03-02',
        writtenFrom: entry.written[0]!,
        writtenTo: entry.written.at(-1)!,
        lateRemark: null,
        important: false,
        witnessesRequired: 1,
        amends: amended
          ? { entryId: amended.entry.id, number: amended.entry.number, bodySha256: amended.bodySha256 }
          : null,
      },
      authors: [
        {
          subjectId: idOf('maren'),
          name: people.maren.name,
          revisions: Array.from({ length: entry.revisions }, (_, i) => i + 1),
          exception: null,
        },
      ],
      contributors: hasRun
        ? [
            {
              subjectId: idOf('maren'),
              name: people.maren.name,
              acts: ['calculation', 'file', 'reading', 'run'],
            },
          ]
        : [],
      content: entry.content as unknown as RecordBody['content'],
      runs: entry.runs,
      files: [...entry.files].reverse(),
      calculations: entry.calculations,
      quotes: entry.calculations.map(({ id }) => ({
        nodeId: 'q1',
        calculationId: id,
        pointer: '/g2',
        shown: shownText(0.02, 0.00257218972862),
      })),
      history: {
        returns: entry.returns,
        voided: entry.voided.map(({ built, signatureSha256, time }) => ({
          recordSha256: built.recordSha256,
          signatureSha256,
          time,
        })),
      },
    })
  }

  private async sign(entry: Entry, who: Who, meaning: Meaning): Promise<void> {
    const key = this.keys.get(who)!
    entry.body ??= this.bodyOf(entry)
    const time = this.now(5)
    const run = entry.runs[0]
    const present =
      meaning === 'witness-present' && run ? { run: run.number, from: run.startedAt, to: time } : undefined
    const newest = this.events.at(-1)!
    const signing: Signing = {
      id: idOf(`signing ${entry.number} ${who} ${this.events.length}`),
      meaning,
      statement: signingStatement(
        meaning,
        { laboratory: name, number: entry.number, revision: entry.revisions, title: `Entry ${entry.number}` },
        present,
      ),
      signer: {
        subjectId: idOf(who),
        name: people[who].name,
        role: people[who].role,
        certificateSha256: key.certificate!.sha256,
        enrolmentSha256: key.enrolmentSha256,
      },
      time,
      zone: 'Europe/Berlin',
      presentFor: present && run ? { runId: run.id, from: present.from, to: present.to } : null,
      opened: meaning === 'authorship' ? null : [{ kind: 'text', id: entry.id, time }],
      release: '1.0.0',
      policyVersion: '1',
      ledger: { sequence: newest.event.sequence, leafHash: newest.leafHash },
      earlier: entry.living.map(({ built, signatureSha256 }) => ({
        recordSha256: built.recordSha256,
        signatureSha256,
        meaning: built.record.signing.meaning,
        subjectId: built.record.signing.signer.subjectId,
        time: built.record.signing.time,
      })),
    }
    const built = buildRecord(entry.body, signing)
    const signature = signMessage(key.seed, built.bytes)
    const signatureSha256 = sha256Hex(signature)
    const { event } = this.event(
      'entry.signed',
      entry.subject,
      { recordSha256: built.recordSha256, signatureSha256, meaning, bodySha256: entry.body.bodySha256 },
      who,
    )
    const timeStamp = await this.tsa.stamp(signature, new Date(event.time))
    entry.living.push({
      record: built.bytes,
      signature,
      certificatePem: key.certificate!.pem,
      timeStamp,
      built,
      key,
      signatureSha256,
    })
  }

  private giveBack(entry: Entry, reason: string): void {
    const voided = entry.living.map(({ built }) => built.recordSha256)
    const { event } = this.event('entry.returned', entry.subject, { reason, voided }, 'farid')
    entry.returns.push({ bySubjectId: idOf('farid'), reason, time: event.time })
    entry.voided.push(...entry.living.map((signature) => ({ ...signature, time: event.time })))
    entry.living = []
    entry.body = null
  }

  private async seal(entry: Entry): Promise<void> {
    const bodySha256 = entry.body!.bodySha256
    this.event('entry.sealed', entry.subject, {
      bodySha256,
      signatures: entry.living.map(({ built }) => built.recordSha256),
    })
    if (entry.amends) this.event('entry.amended', entry.amends.subject, { byEntryId: entry.id, bodySha256 })
    entry.rendered = await this.render(entry)
    const signers = [...entry.living, ...entry.voided].map(({ key }) => key.enrolmentSha256)
    const reached = reachedKeys(signers, this.keyInputs(), this.keys.get('bram')!.enrolmentSha256)
    const subjects: Subject[] = reached.map(({ enrolment }) => ({ kind: 'key', id: enrolment.id }))
    const chains = [...subjects, ...(entry.amends ? [entry.amends.subject] : [])].map(({ kind, id }) => {
      const last = this.events.filter(({ event }) => event.subject.id === id).at(-1)!
      return {
        kind: kind as 'key' | 'entry',
        id,
        subjectSequence: last.event.subjectSequence,
        digest: last.digest,
      }
    })
    this.event('entry.rendered', entry.subject, renderedPayload(entry.rendered, chains))
    await this.head()
  }

  private async render(entry: Entry): Promise<{ name: string; bytes: Uint8Array }[]> {
    const pdf = await PDFDocument.create()
    pdf.addPage([300, 400])
    const date = new Date(this.clock)
    for (const [i, { record, built }] of entry.living.entries()) {
      const attached = `${i + 1}-${built.record.signing.meaning}-record.json`
      await pdf.attach(record, attached, {
        mimeType: 'application/json',
        creationDate: date,
        modificationDate: date,
      })
    }
    pdf.setCreationDate(date)
    pdf.setModificationDate(date)
    const results = [...entry.results].flatMap(([label, bytes]) => [
      { name: `calculations/${label}/result.json`, bytes },
      {
        name: `calculations/${label}/result.csv`,
        bytes: utf8Bytes('quantity,value,u\r\ng2,0.0200,0.0026\r\n'),
      },
      {
        name: `calculations/${label}/figure.svg`,
        bytes: utf8Bytes('<svg xmlns="http://www.w3.org/2000/svg"/>\n'),
      },
    ])
    return [
      { name: 'entry.pdf', bytes: await pdf.save() },
      { name: 'entry.html', bytes: utf8Bytes(`<!doctype html><title>${entry.number}</title>\n`) },
      ...results,
    ]
  }

  // ----- what a bundle is built from

  private keyInputs(): KeyInput[] {
    return [...this.keys.values()].map((key) => ({
      ...key.input,
      events: this.events
        .filter(({ event }) => event.subject.id === key.subject.id)
        .map(({ event }) => event),
    }))
  }

  anchors() {
    return buildAnchors({
      laboratory: this.id,
      caSha256: this.ca.root.sha256,
      ledgerKeysSha256: this.ledgerSeeds.map((seed) => sha256Hex(spkiOf(publicKeyOf(seed)))),
      rootEnrolmentSha256: this.keys.get('bram')!.enrolmentSha256,
      tsaRootsSha256: [this.tsa.root.sha256],
    })
  }

  async bundleInput(change: Partial<BundleInput> = {}): Promise<BundleInput> {
    const last = this.heads.at(-1)!
    return {
      laboratory: { id: this.id, name },
      release: '1.0.0',
      scope: { kind: 'notebook', number: 'N-07' },
      head: last.head,
      headSignature: last.signature,
      headTimeStamp: last.timeStamp,
      tree: this.tree(),
      anchors: this.anchors(),
      rotations: this.rotations,
      ledgerKeys: this.ledgerSeeds.map(publicKeyOf),
      pki: {
        caPem: this.ca.root.pem,
        crlPem: await this.ca.revocationList(new Date(last.head.time)),
        tsaChainPem: this.tsa.root.pem,
      },
      keys: this.keyInputs(),
      entries: this.entries.map((entry) => this.entryInput(entry)),
      leftOut: [],
      checkerHtml: utf8Bytes('<!doctype html><title>Checker</title>\n'),
      sign: (bytes) => signMessage(this.ledgerSeeds.at(-1)!, bytes),
      ...change,
    }
  }

  private entryInput(entry: Entry): BundleInput['entries'][number] {
    const subjects = [entry.id, ...entry.runs.map((run) => run.id)]
    return {
      entryId: entry.id,
      number: entry.number,
      signatures: entry.living,
      voided: entry.voided,
      rendered: entry.rendered,
      files: entry.files.map(({ id, name: fileName, size, sha256 }) => ({
        id,
        name: fileName,
        size,
        sha256,
        sha512: sha512Hex(entry.bytes.get(id)!),
        leftOut: false,
      })),
      events: this.events.map(({ event }) => event).filter((event) => subjects.includes(event.subject.id)),
    }
  }

  /** The bundle's files by path relative to the top folder, raw ones filled in. */
  async files(
    change: Partial<BundleInput> = {},
  ): Promise<{ topFolder: string; files: Map<string, Uint8Array> }> {
    const bundle: Bundle = buildBundle(await this.bundleInput(change))
    const raw = new Map(this.entries.flatMap((entry) => [...entry.bytes]))
    const files = bundle.files.map((file): [string, Uint8Array] => [
      file.path.slice(bundle.topFolder.length + 1),
      'bytes' in file ? file.bytes : raw.get(file.raw)!,
    ])
    return { topFolder: bundle.topFolder, files: new Map(files) }
  }
}
