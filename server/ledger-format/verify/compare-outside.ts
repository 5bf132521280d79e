import { z } from 'zod'
import { anchorsForm } from '../anchors.ts'
import type { Json } from '../canonical-json.ts'
import { fromBase64, fromHex } from '../digest.ts'
import { checkForm, hexForm } from '../forms.ts'
import { headBytes, headForm } from '../head.ts'
import { verifyConsistency } from '../merkle.ts'
import type { Case } from './case.ts'
import { tsaRoots } from './check-authorities.ts'
import { Missing, need } from './report.ts'
import { checkSigned } from './signed-by.ts'

export type AnchorsState = 'matched' | 'not-given' | 'different'

/** `--anchors`: whose keys these are. */
export function compareAnchors(c: Case, given: Json): AnchorsState {
  const answer = c.report.check('anchors given', '--anchors', () => {
    checkForm(anchorsForm, given)
    const own = c.anchors
    for (const member of ['laboratory', 'caSha256', 'rootEnrolmentSha256'] as const) {
      need(given[member] === own[member], `another ${member}`)
    }
    need(
      tsaRoots(c).every((root) => given.tsaRootsSha256.includes(root)),
      'a time-stamp authority’s root that is not listed',
    )
    const [shorter, longer] = [given.ledgerKeysSha256, c.keyChain()].sort((a, b) => a.length - b.length)
    const begins = shorter?.length !== 0 && shorter?.every((key, i) => key === longer?.[i]) === true
    need(begins, 'other ledger keys')
    return 'matched' as const
  })
  return answer ?? 'different'
}

/** The answer of GET /ledger/head; members beyond these do not matter. */
const givenHeadForm = z.looseObject({ head: headForm, signature: z.string() })
/** The answer of GET /ledger/consistency. */
const givenProofForm = z.looseObject({ from: z.int(), to: z.int(), path: z.array(hexForm) })

/** `--head` with `--consistency`: the bundle's head and one from elsewhere belong to one history. */
export function compareHead(c: Case, given: Json, proof: Json | undefined): void {
  c.report.check('head given', '--head', () => {
    checkForm(givenHeadForm, given)
    const { head, signature } = given
    need(head.laboratory === c.head.laboratory, 'another laboratory')
    const key = c.ledgerKeys.get(head.keySha256)
    if (key) checkSigned(key, headBytes(head), fromBase64(signature))
    else
      c.report.remark(
        'head given',
        '--head',
        'its key is newer than this bundle; its signature was not checked',
      )
    if (head.epoch !== c.head.epoch) throw new Missing('not comparable: another epoch')
    const [older, newer] = head.treeSize <= c.head.treeSize ? [head, c.head] : [c.head, head]
    if (older.treeSize === newer.treeSize) {
      need(older.rootHash === newer.rootHash, 'same size, another history')
      return
    }
    if (proof === undefined) throw new Missing('not comparable without --consistency')
    checkForm(givenProofForm, proof)
    const fits = proof.from === older.treeSize && proof.to === newer.treeSize
    if (!fits)
      throw new Missing(`not comparable: the proof is not from ${older.treeSize} to ${newer.treeSize}`)
    const path = proof.path.map(fromHex)
    const one = verifyConsistency(
      older.treeSize,
      fromHex(older.rootHash),
      newer.treeSize,
      fromHex(newer.rootHash),
      path,
    )
    need(one, 'the two trees are not one history')
  })
}
