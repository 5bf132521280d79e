import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { anchorsBytes, type Anchors } from '../../../../server/ledger-format/anchors.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { saveAsFile } from '../save-as-file.ts'
import { eventNumber } from '../event-number.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { Button } from '../../../ui/button.tsx'
import { groupedDigest } from '../../../ui/digest.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts, Section } from '../../../ui/sheet.tsx'
import { anchorsQuery, headQuery } from '../queries.ts'

/** Digests of the laboratory's root keys. Whoever holds them from elsewhere can tell a bundle rebuilt with other keys. */
export function AnchorsSection() {
  const anchors = useQuery(anchorsQuery)
  return (
    <Section title="Anchors">
      <p className="mb-2">
        Keep these apart from any bundle, on paper or in a mail. A bundle remade with other keys agrees with
        itself; only the anchors tell that the keys are not this laboratory’s.
      </p>
      {anchors.error && <Message kind="warn">{sentenceOf(anchors.error)}</Message>}
      {anchors.data && <AnchorsShown anchors={anchors.data} />}
    </Section>
  )
}

function AnchorsShown({ anchors }: { anchors: Anchors }) {
  const [copied, setCopied] = useState(false)
  const bytes = anchorsBytes(anchors)
  return (
    <>
      <div className="text-1">
        <Facts
          facts={[
            { name: 'Laboratory', value: anchors.laboratory },
            { name: 'Authority', value: groupedDigest(anchors.caSha256) },
            { name: 'First manager', value: groupedDigest(anchors.rootEnrolmentSha256) },
            ...anchors.ledgerKeysSha256.map((key, at) => ({
              name: `Ledger key ${at + 1}`,
              value: groupedDigest(key),
            })),
            ...anchors.tsaRootsSha256.map((root, at) => ({
              name: `Time stamps ${at + 1}`,
              value: groupedDigest(root),
            })),
          ]}
        />
      </div>
      <div className="hs-actions mt-3 print:hidden">
        <Button
          size="small"
          icon="download"
          onClick={() => saveAsFile(bytes, 'anchors.json', 'application/json')}
        >
          Download anchors.json
        </Button>
        <Button
          size="small"
          onClick={() =>
            void navigator.clipboard.writeText(new TextDecoder().decode(bytes)).then(() => setCopied(true))
          }
        >
          {copied ? 'Copied' : 'Copy'}
        </Button>
        <Button size="small" onClick={() => window.print()}>
          Print
        </Button>
      </div>
    </>
  )
}

/** The newest signed head: what a bundle or a mailed head is compared with. */
export function HeadSection() {
  const signed = useQuery(headQuery)
  if (signed.error) return null
  return (
    <Section title="Newest head" count={signed.data && eventNumber(signed.data.head.treeSize)}>
      {signed.data && (
        <>
          <p className="mb-2">
            Signed {dateAndTime(signed.data.head.time)},{' '}
            {signed.data.timeStamp ? 'with a time stamp' : 'not yet time-stamped'}. A head kept outside shows
            a history rewritten here.
          </p>
          <p className="hs-fig hs-digest-full mb-3 text-1">{groupedDigest(signed.data.head.rootHash)}</p>
          <Button
            size="small"
            icon="download"
            onClick={() =>
              saveAsFile(
                new TextEncoder().encode(JSON.stringify(signed.data)),
                `head-${signed.data.head.treeSize}.json`,
                'application/json',
              )
            }
          >
            Download head
          </Button>
        </>
      )}
    </Section>
  )
}
