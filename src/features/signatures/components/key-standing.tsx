import type { ReactNode } from 'react'
import type { SigningKey } from '../../../../server/contract/signatures.ts'
import { dateAndTime, longDate } from '../../../lib/times.ts'
import { Digest, groupedDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts } from '../../../ui/sheet.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { keyDigits } from '../enrolment.ts'
import { keyStanding } from '../key-words.ts'
import { lockedWords } from '../signing-problems.ts'

/** How my key stands: its digits, what it can do now, and what is to be done next. */
export function KeyStanding({ signingKey }: { signingKey: SigningKey }) {
  const { status, enrolmentSha256, expiresAt, lockedUntil } = signingKey
  const { state, words } = keyStanding[status]
  return (
    <div className="grid gap-4">
      <div className="flex flex-wrap items-start gap-4">
        {enrolmentSha256 && <FringeMark sha256={enrolmentSha256} size={72} />}
        <div className="min-w-0 flex-1 basis-64">
          <h2 className="text-6 leading-tight font-semibold">
            <StateGlyph state={state} wordless /> {words}
          </h2>
          <p className="mt-1">{standingSentence(signingKey)}</p>
        </div>
      </div>
      {status === 'locked' && <Message kind="warn">{lockedWords(lockedUntil)}</Message>}
      {enrolmentSha256 && (
        <Facts
          facts={[
            { name: 'Key digits', value: keyDigits(enrolmentSha256) },
            { name: 'Enrolment', value: groupedDigest(enrolmentSha256) },
            ...(expiresAt ? [{ name: 'Certificate until', value: longDate(expiresAt), words: true }] : []),
            ...(lockedUntil ? [{ name: 'Locked until', value: dateAndTime(lockedUntil), words: true }] : []),
          ]}
        />
      )}
    </div>
  )
}

function standingSentence({ status, enrolmentSha256 }: SigningKey): ReactNode {
  switch (status) {
    case 'none':
      return 'You can read and write, but not sign. Enrol a key, then have it endorsed.'
    case 'awaiting-endorsement':
      return (
        <>
          Go to a manager or a supervisor. That person checks who you are, compares these digits with you and
          endorses the key: {enrolmentSha256 && <Digest sha256={enrolmentSha256} />}
        </>
      )
    case 'active':
      return 'It signs for you. Your passphrase is asked for with every signature.'
    case 'locked':
      return 'It signs again when the lock ends. Nothing was signed and nothing is lost.'
    case 'expired':
      return 'Signatures given stay valid. Enrol a new key to sign again.'
    case 'revoked':
      return 'Signatures given before stay valid. Enrol a new key to sign again.'
  }
}
