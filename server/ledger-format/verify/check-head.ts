import { canonicalBytes, parseCanonical, parseJson } from '../canonical-json.ts'
import { dataPath, ledgerKeyFolder, ledgerKeyPath } from '../bundle/layout.ts'
import { fromBase64, sha256Hex } from '../digest.ts'
import { rawKeyOf } from '../ed25519.ts'
import { checkForm } from '../forms.ts'
import { headForm, type Head } from '../head.ts'
import { rotationForm, rotationStatementBytes } from '../rotation.ts'
import { utf8Bytes, utf8Text } from '../utf8.ts'
import type { Case } from './case.ts'
import { sameBytes } from '../bytes.ts'
import { pemBlock } from './pem.ts'
import { Missing, need } from './report.ts'
import { checkSigned } from './signed-by.ts'
import { checkTimeStamp } from './time-stamp.ts'

/** Stamps may be this much earlier than what they stamp: two clocks. */
export const clockMargin = 60_000

/** Rotations followed from the first key; keys/ holds exactly these keys (shapes 4, end). */
export function checkLedgerKeys(c: Case): void {
  for (const path of [...c.paths].filter((candidate) => candidate.startsWith(ledgerKeyFolder)).sort()) {
    c.report.check('ledger key', path, () => {
      const spki = pemBlock(c.read(path), 'PUBLIC KEY')
      const key = rawKeyOf(spki)
      const digest = sha256Hex(spki)
      need(path === ledgerKeyPath(digest), 'file is not named after its key')
      c.ledgerKeys.set(digest, key)
    })
  }
  c.report.check('rotations', dataPath.rotations, () => checkRotations(c))
  const named = c.report.check('ledger keys', ledgerKeyFolder, () => c.anchors.ledgerKeysSha256) ?? []
  for (const digest of [...new Set([...c.ledgerKeys.keys(), ...named])].sort()) {
    c.report.check('ledger key', ledgerKeyPath(digest), () => {
      need(c.ledgerKeys.has(digest), 'file is absent')
      need(c.keyChain().includes(digest), 'a key outside the chain of ledger keys')
    })
  }
}

function checkRotations(c: Case): void {
  const lines = utf8Text(c.read(dataPath.rotations)).split('\n')
  need(lines.pop() === '', 'last line has no end')
  lines.forEach((line, i) => {
    c.report.check('rotation', `${dataPath.rotations} line ${i + 1}`, () =>
      checkRotation(c, parseJson(utf8Bytes(line))),
    )
  })
  need(
    c.keyChain().join() === c.anchors.ledgerKeysSha256.join(),
    'the keys are not those of data/anchors.json in order',
  )
}

function checkRotation(c: Case, value: unknown): void {
  checkForm(rotationForm, value)
  const { statement, signatureFrom, signatureTo } = value
  const chain = c.keyChain()
  need(
    statement.from === chain.at(-1) && !chain.includes(statement.to),
    'does not continue the chain of keys',
  )
  need(statement.laboratory === c.bundle.laboratory, 'another laboratory')
  const before = c.rotations.at(-1)
  need(!before || before.time <= statement.time, 'earlier than the rotation before')
  const key = c.ledgerKey(statement.to)
  need(sameBytes(fromBase64(statement.publicKey), key), 'publicKey is not the new key')
  const bytes = rotationStatementBytes(statement)
  checkSigned(c.ledgerKey(statement.from), bytes, fromBase64(signatureFrom), 'signatureFrom')
  checkSigned(key, bytes, fromBase64(signatureTo), 'signatureTo')
  c.rotations.push(statement)
}

/** The head that all proofs lead to: form, signature, place among the rotations, time stamp. */
export function checkHead(c: Case): void {
  c.report.check('head', dataPath.head, () => {
    const head = parseCanonical(c.read(dataPath.head)) as unknown
    c.head = head as Head
    checkForm(headForm, head)
    need(head.laboratory === c.bundle.laboratory, 'another laboratory')
    const { treeSize, rootHash, keySha256, previous } = head
    const named = canonicalBytes({ treeSize, rootHash, keySha256 })
    need(sameBytes(named, canonicalBytes(c.bundle.head)), 'data/bundle.json names another head')
    const repeats = previous?.treeSize === treeSize && previous.rootHash === rootHash
    need(!previous || previous.treeSize < treeSize || repeats, 'previous head is newer')
  })
  c.report.check('head signature', dataPath.headSignature, () => {
    const { keySha256, time } = c.head
    need(c.keyChain().includes(keySha256), 'by a key outside the chain of ledger keys')
    checkSigned(c.ledgerKey(keySha256), c.read(dataPath.head), c.read(dataPath.headSignature))
    for (const { from, to, time: rotated } of c.rotations) {
      need(from !== keySha256 || time <= rotated, 'dated after the rotation away from its key')
      need(to !== keySha256 || rotated <= time, 'dated before the rotation to its key')
    }
  })
  c.report.check('head time stamp', dataPath.headTimeStamp, () => {
    if (!c.call(dataPath.headTimeStamp)) throw new Missing('not yet time-stamped')
    const stamp = checkTimeStamp(c.read(dataPath.headSignature), c.read(dataPath.headTimeStamp), c.tsaChain)
    need(stamp.time.getTime() >= Date.parse(c.head.time) - clockMargin, 'stamped before the head was made')
  })
}
