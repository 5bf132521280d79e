import { anchorsForm } from '../anchors.ts'
import { parseCanonical } from '../canonical-json.ts'
import { checkForm } from '../forms.ts'
import { dataPath } from '../bundle/layout.ts'
import type { Case } from './case.ts'
import { need, Wrong } from './report.ts'
import { checkIssuedBy, isSelfIssued, readCertificates, readRevocationList } from './x509.ts'

/** The bundle's own anchors.json, which every other digest is compared with. */
export function checkOwnAnchors(c: Case): void {
  c.report.check('anchors', dataPath.anchors, () => {
    const anchors = parseCanonical(c.read(dataPath.anchors)) as unknown
    c.anchors = anchors as Case['anchors']
    checkForm(anchorsForm, anchors)
    need(anchors.laboratory === c.bundle.laboratory, 'another laboratory than data/bundle.json names')
    const sorted = [...new Set(anchors.tsaRootsSha256)].sort()
    need(
      sorted.join() === anchors.tsaRootsSha256.join() && anchors.ledgerKeysSha256.length > 0,
      'a list is empty, unsorted or has doubles',
    )
  })
}

/** Certificate authority, revocation list, and the time-stamp authority's certificates. */
export function checkAuthorities(c: Case): void {
  c.report.check('certificate authority', dataPath.ca, () => {
    const [ca, ...more] = readCertificates(c.read(dataPath.ca))
    if (!ca || more.length > 0) throw new Wrong('not one certificate')
    c.ca = ca
    checkIssuedBy(ca, ca)
    need(ca.authority?.ca === true, 'not an authority')
    need(ca.sha256 === c.anchors.caSha256, 'not the one of anchors.json')
  })
  c.report.check('revocation list', dataPath.crl, () => {
    c.crl = readRevocationList(c.read(dataPath.crl), c.ca)
  })
  c.report.check('time-stamp authority', dataPath.tsaChain, () => {
    c.tsaChain = readCertificates(c.read(dataPath.tsaChain))
    const roots = tsaRoots(c)
    const listed = c.anchors.tsaRootsSha256
    need(roots.length > 0 && roots.every((root) => listed.includes(root)), 'its root is not in anchors.json')
  })
}

/** SHA-256 of the self-issued certificates of tsa-chain.pem. @throws when one did not sign itself. */
export function tsaRoots(c: Case): string[] {
  return c.tsaChain.filter(isSelfIssued).map((root) => {
    checkIssuedBy(root, root)
    return root.sha256
  })
}
