import { ledgerKeyPath } from './layout.ts'

/**
 * VERIFY.md: how to check a bundle with `openssl` 3 and the usual file tools alone. Commands are those of shapes 2, run in
 * the top folder of the unpacked bundle.
 */
export function instructions(parts: {
  topFolder: string
  bagKeySha256: string
  laboratory: string
  demo: boolean
}): string {
  const demo = parts.demo
    ? 'This bundle comes from a demonstration laboratory: its people are invented and its passphrase is published.\n\n'
    : ''
  return `# How to verify this bundle

${parts.topFolder}
Laboratory: ${parts.laboratory}

${demo}You need the openssl command (3.0 or later) and sha256sum, sha512sum, find, sort, cut, diff. Nothing here uses a network.
Run every command in the folder that has this name and holds bagit.txt, unless it says otherwise.

## Before all else: whose keys are these?

A bundle carries its own keys. Whoever rebuilt all of it with keys of his own would pass every command below. So compare
data/anchors.json with the anchors that the laboratory gave you apart from this bundle (by mail, on paper):

    sha256sum data/anchors.json
    openssl x509 -in data/pki/ca.pem -outform DER | sha256sum                      # caSha256
    for k in data/ledger/keys/*.pem; do openssl pkey -pubin -in "$k" -outform DER | sha256sum; done   # ledgerKeysSha256
    sha256sum data/keys/*/*/enrolment.json                                          # one is rootEnrolmentSha256
    openssl x509 -in data/pki/tsa-chain.pem -outform DER | sha256sum               # in tsaRootsSha256

The same holds for programs: data/check.html lies in the bundle, so it is the tool of whoever made the bundle. Its release
digest is printed beside the anchors; compare it (sha256sum data/check.html) or use a copy that you got elsewhere.

## One signature over every file

    openssl pkeyutl -verify -pubin -inkey ${ledgerKeyPath(parts.bagKeySha256)} -rawin -in tagmanifest-sha256.txt -sigfile signature/tagmanifest-sha256.sig
    sha256sum --strict -c tagmanifest-sha256.txt manifest-sha256.txt
    sha512sum --strict -c tagmanifest-sha512.txt manifest-sha512.txt

The manifests must list the very files that are here; this prints nothing:

    find data -type f | LC_ALL=C sort > ../found.txt; cut -c67- manifest-sha256.txt | diff - ../found.txt
    ls -A

The second lists bag-info.txt bagit.txt data manifest-sha256.txt manifest-sha512.txt signature tagmanifest-sha256.txt
tagmanifest-sha512.txt, and nothing else.

## Each signature of an entry

In data/entries/<entry>/signatures/<k>-<meaning>/ (and voided/ alike):

    openssl x509 -in signer.pem -noout -pubkey > k.pem && openssl pkeyutl -verify -pubin -inkey k.pem -rawin -in record.json -sigfile record.sig
    openssl pkey -pubin -in k.pem -outform DER | tail -c 32 | base64

(write k.pem elsewhere if the folder must stay as it is). The second prints \`publicKey\` of the enrolment.json in data/keys/
whose SHA-256 is \`signing.signer.enrolmentSha256\` of record.json. That folder's enrolment.sig is by the same key over
enrolment.json; its endorsement.sig is by the endorser's key, named in endorsement.json, over endorsement.json:

    openssl pkeyutl -verify -pubin -inkey k.pem -rawin -in enrolment.json -sigfile enrolment.sig

## Certificate and time stamp

T is the time of the event \`entry.signed\` in ledger/events.jsonl that names this record (SHA-256 of record.json), in
seconds since 1970 (date -d TIME +%s). genTime is the time that the stamp itself tells:

    openssl verify -attime T -CAfile ../../../../pki/ca.pem signer.pem
    openssl ts -reply -in timestamp.tsr -text
    openssl ts -verify -data record.sig -in timestamp.tsr -CAfile ../../../../pki/tsa-chain.pem -attime <genTime>
    openssl crl -in ../../../../pki/crl.pem -noout -text

A certificate that the list revokes counts up to its revocation. (A list newer than T cannot be given to -crl_check.) A time
stamp by an authority that the laboratory runs itself proves nothing to outsiders.

## The ledger

data/ledger/head.json is signed by a ledger key and stamped (the same commands, with data/ledger/head.sig and head.tsr).
Every line of an events.jsonl is one event; \`subjectPrevious\` is the SHA-256 of the line before it of the same subject, without
the newline. The leaf hash is SHA-256 of one zero byte and the line; proofs.json leads from it to \`rootHash\` of head.json as
RFC 9162 section 2.1.3.2 says. data/check.html, or \`npm run verify -- BUNDLE.zip --anchors FILE\` of a checkout, does this.

## What a bundle cannot show

- Whose keys these are, without the anchors.
- That nothing happened since its head: compare with a later head (\`--head\`, \`--consistency\`).
- In a bundle of several entries, a chain cut after its entry's own \`entry.rendered\`: the whole ledger shows it.
- That what was written is true. A witness who read and understood says that the page existed, not that it is right.
- entry.pdf and entry.html are the server's rendering of what was signed; record.json is what was signed.
`
}
