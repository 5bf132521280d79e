/** What a web page cannot prevent (rulings.md B1), said plainly where a passphrase is chosen. */
export function WhatAPageCannotPrevent() {
  return (
    <div className="grid gap-2">
      <p>
        The key is made on this device. The server keeps it only locked by your passphrase, and a key counts
        only after another person has endorsed it with a signature of his or her own. A stolen database signs
        for nobody.
      </p>
      <p>
        <b>What this cannot prevent:</b> whoever runs the server also sends the program of this page. A
        changed program could take your passphrase while you type it, or show one page and sign another. No
        web page can rule that out.
      </p>
      <p>
        What helps: sign on a device that you trust, compare the 64 digits that you sign with those in a
        bundle, and keep the heads of the ledger that come by mail. If the passphrase may have become known,
        tell the manager at once; the key is then revoked, and what it signed before stays valid.
      </p>
    </div>
  )
}
