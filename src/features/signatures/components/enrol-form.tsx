import { useState, type FormEvent } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { Checkbox } from '../../../ui/checkbox.tsx'
import { PassphraseField } from '../../../ui/field.tsx'
import { Message } from '../../../ui/message.tsx'
import { Progress } from '../../../ui/progress.tsx'
import { enrolmentStatement } from '../../../../server/ledger-format/statements.ts'
import { useEnrolKey, type Owner } from '../mutations.ts'
import { drawPhrase, phraseBits, wordsInPhrase } from '../passphrase/six-words.ts'
import { judgePassphrase, leastLength } from '../passphrase/strength.ts'
import { useShare } from '../use-share.ts'

/** Makes a signing key: a passphrase chosen or drawn, written down once more, and the statement that the key signs. */
export function EnrolForm({
  me,
  laboratory,
  replaces,
  onEnrolled,
}: {
  me: Owner
  laboratory: { id: string; name: string }
  replaces: boolean
  onEnrolled: () => void
}) {
  const [passphrase, setPassphrase] = useState('')
  const [again, setAgain] = useState('')
  const [drawn, setDrawn] = useState<string | null>(null)
  const [meant, setMeant] = useState(false)
  const [tried, setTried] = useState(false)
  const [share, setShare] = useShare()
  const enrol = useEnrolKey(me, laboratory)
  const judgement = judgePassphrase(passphrase)
  const differs = again !== passphrase ? 'This is not the same passphrase as above.' : null

  function submit(event: FormEvent) {
    event.preventDefault()
    setTried(true)
    if (judgement.refusal !== null || differs !== null || !meant || enrol.isPending) return
    setShare(0)
    enrol.mutate(
      { passphrase, onProgress: setShare },
      {
        onSettled: () => setShare(null),
        onSuccess: () => {
          setPassphrase('')
          setAgain('')
          setDrawn(null)
          onEnrolled()
        },
      },
    )
  }

  return (
    <form className="grid max-w-140 gap-4" onSubmit={submit}>
      <Drawn phrase={drawn} onDraw={() => setDrawn(drawPhrase())} onTake={setPassphrase} />
      <PassphraseField
        label="Signing passphrase"
        hint={`${leastLength} characters or more, any characters, paste is allowed. Not the one you sign in with.`}
        value={passphrase}
        readOnly={enrol.isPending}
        error={tried ? judgement.refusal : null}
        onChange={(event) => setPassphrase(event.target.value)}
      />
      {passphrase !== '' && <Strength judgement={judgement} />}
      <PassphraseField
        label="The same once more"
        value={again}
        readOnly={enrol.isPending}
        error={tried ? differs : null}
        onChange={(event) => setAgain(event.target.value)}
      />
      <blockquote className="hs-prose">
        “{enrolmentStatement({ name: me.name, laboratory: laboratory.name })}”
      </blockquote>
      <Checkbox
        label="I mean this, and the new key may sign it."
        hint={
          replaces
            ? 'The key you have signs until the new one is endorsed, and stays valid for what it has signed.'
            : undefined
        }
        checked={meant}
        onChange={setMeant}
      />
      {tried && !meant && <p className="hs-error">The key signs this sentence; tick that you mean it.</p>}
      <div>
        <Button kind="primary" type="submit" icon="key" busy={enrol.isPending}>
          {enrol.isPending ? 'Enrolling' : 'Enrol key'}
        </Button>
      </div>
      {share !== null && (
        <div role="status">
          <Progress
            label="Making the key"
            share={share}
            words="The key is made and wrapped on this device, which takes a few seconds by design."
          />
        </div>
      )}
      {enrol.error && (
        <Message kind="fault" title="No key was enrolled.">
          {sentenceOf(enrol.error)}
        </Message>
      )}
    </form>
  )
}

function Drawn({
  phrase,
  onDraw,
  onTake,
}: {
  phrase: string | null
  onDraw: () => void
  onTake: (phrase: string) => void
}) {
  return (
    <div className="bg-well p-3">
      <p>
        {numberWords} words drawn at random make a strong passphrase that can be remembered:{' '}
        {Math.round(phraseBits)} bits.
      </p>
      {phrase !== null && (
        <>
          <p className="hs-fig my-2 text-4 whitespace-normal">{phrase}</p>
          <p className="hs-hint">
            Write it on paper and keep that apart from this computer until you know it. It is shown nowhere
            else.
          </p>
        </>
      )}
      <div className="hs-actions mt-2">
        <Button size="small" onClick={onDraw}>
          {phrase === null ? `Draw ${wordsInPhrase} words` : 'Draw others'}
        </Button>
        {phrase !== null && (
          <Button size="small" onClick={() => onTake(phrase)}>
            Take these
          </Button>
        )}
      </div>
    </div>
  )
}

const numberWords = { 6: 'Six', 7: 'Seven' }[wordsInPhrase as number] ?? String(wordsInPhrase)

/** Estimated strength on a scale to 80 bits, with its meaning in words. */
function Strength({ judgement }: { judgement: ReturnType<typeof judgePassphrase> }) {
  const { bits, refusal, meaning } = judgement
  return (
    <Progress
      label="Strength of the passphrase"
      share={Math.min(1, bits / 80)}
      words={refusal ?? `About ${bits} bits (estimate): ${meaning}.`}
    />
  )
}
