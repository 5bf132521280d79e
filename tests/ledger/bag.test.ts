import { createHash } from 'node:crypto'
import { execFileSync, spawnSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { parseJson, utf8Text } from '../../server/ledger-format/index.ts'
import { rawName, topFolderName } from '../../server/ledger-format/bundle/layout.ts'
import { SampleLaboratory } from './sample/laboratory.ts'

let files: Map<string, Uint8Array>
let topFolder: string
let folder: string

beforeAll(async () => {
  ;({ topFolder, files } = await (await SampleLaboratory.open()).files())
  folder = join(mkdtempSync(join(tmpdir(), 'bag-')), topFolder)
  for (const [path, bytes] of files) {
    mkdirSync(join(folder, dirname(path)), { recursive: true })
    writeFileSync(join(folder, path), bytes)
  }
})
afterAll(() => rmSync(dirname(folder), { recursive: true }))

const text = (path: string) => utf8Text(files.get(path) ?? new Uint8Array())
const payload = () => [...files.keys()].filter((path) => path.startsWith('data/'))

// RFC 8493, rules of standards.md B6.
describe('the bag', () => {
  it('declares BagIt 1.0 in exactly two lines', () => {
    expect(text('bagit.txt')).toBe('BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n')
  })

  it.each(['sha256', 'sha512'])('lists every payload file once, with its %s', (algorithm) => {
    const lines = text(`manifest-${algorithm}.txt`).trimEnd().split('\n')
    const listed = lines.map((line) => line.slice(line.indexOf('  ') + 2))
    expect(listed).toEqual(payload().sort())
    for (const line of lines) {
      const [digest = '', path = ''] = line.split('  ')
      expect(
        createHash(algorithm)
          .update(files.get(path) ?? '')
          .digest('hex'),
      ).toBe(digest)
    }
  })

  it('counts its payload and names itself', () => {
    const bytes = payload().reduce((sum, path) => sum + (files.get(path)?.length ?? 0), 0)
    expect(text('bag-info.txt')).toContain(`\nPayload-Oxum: ${bytes}.${payload().length}\n`)
    expect(text('bag-info.txt')).toContain(`\nExternal-Identifier: ${topFolder}\n`)
  })
})

// RO-Crate 1.2, rules of standards.md B7.
describe('the crate', () => {
  type Entity = Record<string, unknown> & { '@id': string; '@type': string }
  const graph = () =>
    (
      parseJson(files.get('data/ro-crate-metadata.json') ?? new Uint8Array()) as unknown as {
        '@graph': Entity[]
      }
    )['@graph']
  const entity = (id: string) => graph().find((item) => item['@id'] === id)

  it('has descriptor and root with all that the specification demands', () => {
    expect(entity('ro-crate-metadata.json')).toMatchObject({
      '@type': 'CreativeWork',
      about: { '@id': './' },
      conformsTo: { '@id': 'https://w3id.org/ro/crate/1.2' },
    })
    const root = entity('./')
    for (const member of ['name', 'description', 'datePublished', 'license'])
      expect(root?.[member], member).toBeTruthy()
    expect(root?.['@type']).toBe('Dataset')
  })

  it('gives every entity an id of its own and a type, and only references between them', () => {
    const ids = graph().map((item) => item['@id'])
    expect(new Set(ids).size).toBe(ids.length)
    for (const item of graph()) {
      expect(item['@type']).toBeTruthy()
      for (const value of Object.values(item).flat()) {
        if (typeof value === 'object' && value !== null) expect(Object.keys(value)).toEqual(['@id'])
      }
    }
  })

  it('reaches every payload file through hasPart', () => {
    const parts = (id: string): string[] =>
      ((entity(id)?.hasPart ?? []) as { '@id': string }[]).flatMap(({ '@id': part }) => [
        part,
        ...parts(part),
      ])
    const reached = parts('./').filter((id) => !id.endsWith('/'))
    const due = payload()
      .map((path) => encodeURI(path.slice('data/'.length)))
      .filter((id) => id !== 'ro-crate-metadata.json')
    expect(reached.sort()).toEqual(due.sort())
  })
})

const has = (command: string, argument: string) => spawnSync(command, [argument]).status === 0

// The commands that VERIFY.md gives to an auditor (shapes 2).
describe.runIf(has('openssl', 'version') && has('sha256sum', '--version'))('outside tools', () => {
  const run = (command: string, cwd = folder) =>
    execFileSync('bash', ['-ec', command], { cwd, encoding: 'utf8', stdio: 'pipe' })
  const signature = () => join(folder, 'data/entries/N-07-001/signatures/1-authorship')

  it('check digests and the one signature', () => {
    const commands = text('data/VERIFY.md')
      .split('\n')
      .filter((line) => line.startsWith('    '))
    const first = commands.find((line) => line.includes('tagmanifest-sha256.sig')) ?? ''
    expect(run(first)).toContain('Signature Verified Successfully')
    run(
      'sha256sum --strict -c tagmanifest-sha256.txt manifest-sha256.txt && sha512sum --strict -c tagmanifest-sha512.txt manifest-sha512.txt',
    )
    expect(run(commands.find((line) => line.includes('find data')) ?? 'false')).toBe('')
  })

  it('check a signature, its key, its certificate and its stamp', () => {
    const key = join(dirname(folder), 'k.pem')
    const verified = run(
      `openssl x509 -in signer.pem -noout -pubkey > ${key} && openssl pkeyutl -verify -pubin -inkey ${key} -rawin -in record.json -sigfile record.sig`,
      signature(),
    )
    expect(verified).toContain('Signature Verified Successfully')
    const publicKey = run(`openssl pkey -pubin -in ${key} -outform DER | tail -c 32 | base64`).trim()
    const enrolments = payload()
      .filter((path) => path.endsWith('enrolment.json'))
      .map(text)
    expect(enrolments.filter((enrolment) => enrolment.includes(`"publicKey":"${publicKey}"`))).toHaveLength(1)
    const at = Math.floor(Date.parse('2026-03-02T09:01:00.000Z') / 1000)
    const pki = join(folder, 'data/pki')
    expect(run(`openssl verify -attime ${at} -CAfile ${pki}/ca.pem signer.pem`, signature())).toContain('OK')
    expect(
      run(
        `openssl ts -verify -data record.sig -in timestamp.tsr -CAfile ${pki}/tsa-chain.pem -attime ${at} 2>&1`,
        signature(),
      ),
    ).toContain('Verification: OK')
    expect(run(`openssl crl -in ${pki}/crl.pem -noout -text`)).toContain('Certificate Revocation List')
  })
})

describe('names', () => {
  // Boundary rows of shapes 2, "Raw names"; I stands for the file's id.
  it.each([
    ['a.csv', [], 'a.csv'],
    ['a b-c_d.E', [], 'a b-c_d.E'],
    ['A.csv', ['a.csv'], 'I-A.csv'],
    ['.a', [], 'I-.a'],
    [' a', [], 'I- a'],
    ['a.', [], 'I-a.'],
    ['a ', [], 'I-a '],
    ['..', [], 'I-..'],
    ['a/b', [], 'I-a_b'],
    ['ü.txt', [], 'I-_.txt'],
    ['🔬.csv', [], 'I-_.csv'],
  ])('of the raw file %j beside %j', (name, others, expected) => {
    expect(rawName({ id: 'I', name }, [name, ...others])).toBe(expected)
  })

  it.each([
    [
      'Ridgeway Photonics Laboratory',
      { kind: 'notebook', number: 'N-07' },
      'ridgeway-photonics-laboratory-N-07-2026-03-02',
    ],
    [
      'Institut für Photonik (Süd)',
      { kind: 'entry', number: 'N-07/042' },
      'institut-fur-photonik-sud-N-07-042-2026-03-02',
    ],
    ['光子', { kind: 'selection' }, 'laboratory-selection-2026-03-02'],
  ] as const)('of the top folder: %s', (laboratory, scope, expected) => {
    expect(topFolderName(laboratory, scope, '2026-03-02T23:59:59.999Z')).toBe(expected)
  })
})
