import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { utf8Bytes } from '../../server/ledger-format/utf8.ts'
import { checkTimeStamp } from '../../server/ledger-format/verify/time-stamp.ts'
import { readCertificate, readCertificates } from '../../server/ledger-format/verify/x509.ts'
import { referencePath } from '../support/reference.ts'

const fixtures = referencePath('vectors/rfc3161/test/fixtures')
const read = (...path: string[]) => new Uint8Array(readFileSync(join(fixtures, ...path)))

function check(folder: string, response: string, data: Uint8Array) {
  return checkTimeStamp(data, read(folder, response), readCertificates(read(folder, 'ts_chain.pem')))
}

// Responses of outside authorities; what each must give is standards.md B3, found with OpenSSL 3.0.19.
describe('RFC 3161 time stamps', () => {
  const hello = utf8Bytes('hello')

  it.each(['response-sha256.tsr', 'response-sha384.tsr', 'response-sha512.tsr'])(
    'takes sigstage/%s',
    (name) => {
      expect(check('sigstage', name, hello).time.toISOString()).toMatch(/^2025-05-09T11:5\d:\d\d\.000Z$/)
    },
  )

  it('reads genTime', () => {
    expect(check('sigstage', 'response-sha256.tsr', hello).time.toISOString()).toBe(
      '2025-05-09T11:58:55.000Z',
    )
  })

  it('takes an RSA authority with an intermediate certificate', () => {
    const root = readCertificate(read('identrust', 'ts_chain.pem')) // DER, whatever its name says
    const { time, signer } = checkTimeStamp(hello, read('identrust', 'issue-104.tsr'), [root])
    expect(signer.key.algorithm).toBe('1.2.840.113549.1.1.1')
    expect(time.toISOString()).toBe('2025-03-11T08:52:08.000Z')
  })

  it('takes an authority with an intermediate certificate on P-256', () => {
    expect(check('test_tsa', 'response.tsr', hello).signer.key.curve).toBe('1.2.840.10045.3.1.7')
  })

  it.each([
    ['other data', 'sigstage', 'response-sha256.tsr', utf8Bytes('hellO'), 'of other data'],
    ['a changed signature', 'sigstage', 'response-invalid-signature.tsr', hello, 'does not verify'],
    [
      'a response without its certificate',
      'sigstage',
      'response-no-embedded-cert.tsr',
      hello,
      'not in the time stamp',
    ],
    ['a stamp of another authority', 'test_tsa', 'other_response.tsr', hello, 'no path to a root'],
  ])('refuses %s', (_, folder, name, data, why) => {
    expect(() => check(folder, name, data)).toThrow(why)
  })

  it('refuses another authority’s root', () => {
    const roots = readCertificates(read('test_tsa', 'ts_chain.pem'))
    expect(() => checkTimeStamp(hello, read('sigstage', 'response-sha256.tsr'), roots)).toThrow(
      'no path to a root',
    )
  })

  it('refuses a refusal', () => {
    // TimeStampResp { status { status 2 (rejection) } }
    const refusal = Uint8Array.from([0x30, 0x05, 0x30, 0x03, 0x02, 0x01, 0x02])
    expect(() => checkTimeStamp(hello, refusal, [])).toThrow('not granted')
  })

  it('finds any changed byte of a response', () => {
    const response = read('sigstage', 'response-sha256.tsr')
    const roots = readCertificates(read('sigstage', 'ts_chain.pem'))
    const taken: number[] = []
    for (let at = 0; at < response.length; at += 31) {
      const changed = response.slice()
      changed[at] = (changed[at] ?? 0) ^ 1
      try {
        checkTimeStamp(hello, changed, roots)
        taken.push(at)
      } catch {
        continue
      }
    }
    expect(taken).toEqual([])
  })
})
