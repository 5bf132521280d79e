import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import { stampTime, zoneInWords } from '../../../lib/times.ts'
import { shortDigest } from '../../../ui/digest.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { meaningWords, stampWords } from '../meaning-words.ts'

/** Every signature with printed name, date and time with zone, meaning and statement (21 CFR 11.50); voided ones are struck. */
export function SignatureList({ signatures }: { signatures: EntrySignature[] }) {
  if (signatures.length === 0) return null
  return (
    <details className="mt-5">
      <summary className="hs-link inline-block min-h-8 cursor-pointer">
        Signatures in full <span className="hs-fig">{signatures.length}</span>
      </summary>
      <ul className="mt-2 grid max-w-200 gap-4">
        {signatures.map((each) => (
          <li key={each.id}>
            <p>
              <StateGlyph state={each.voided ? 'withdrawn' : 'ok'} wordless /> <b>{each.signer.name}</b>,{' '}
              {each.signer.role}. {meaningWords[each.meaning]}.
              {each.voided && ' Void: the sheet was reopened or returned after it.'}
            </p>
            <p className="hs-quiet text-2">
              {stampTime(each.time)}, {zoneInWords(new Date(each.time))}; {stampWords(each.timeStamp)}; record{' '}
              <span className="hs-fig">{shortDigest(each.recordSha256)}</span>
            </p>
            <p className={each.voided ? 'text-ink3 line-through' : undefined}>“{each.statement}”</p>
          </li>
        ))}
      </ul>
    </details>
  )
}
