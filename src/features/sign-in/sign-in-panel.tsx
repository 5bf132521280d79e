import type { z } from 'zod'
import type { welcomeSchema } from '../../../server/contract/people.ts'
import { BrandMark } from '../../ui/brand.tsx'
import { Icon } from '../../ui/icon.tsx'
import { Message } from '../../ui/message.tsx'
import { ThemeChoice } from '../../ui/theme-choice.tsx'
import { DemoPeople } from './demo-people.tsx'

type Welcome = z.infer<typeof welcomeSchema>

type PanelProps = { welcome: Welcome; refusal: string | null; returnTo: string }

/** One way in, over the code host; in the demonstration, who can come in and with which passphrase they sign. */
export function SignInPanel({ welcome, refusal, returnTo }: PanelProps) {
  return (
    <section className="hs-sign-in-panel" aria-label="Sign in">
      <div className="hs-sign-in-brand">
        <BrandMark size={30} />
        Halfsilver
      </div>
      <div className="hs-sign-in-form">
        <h1>Sign in to the notebooks of {welcome.laboratory.name}</h1>
        {refusal && <Message kind="fault">{refusal}</Message>}
        <a
          className="hs-button hs-button-primary hs-button-large"
          href={`/auth/github?returnTo=${encodeURIComponent(returnTo)}`}
        >
          <Icon name="key" size={17} />
          Sign in with the code host
        </a>
        <p className="hs-hint">
          The code host tells us who you are. Signing a sheet asks for your signing passphrase, which it never
          learns.
        </p>
        {welcome.demo && <DemoPeople demo={welcome.demo} />}
      </div>
      <div className="hs-sign-in-light">
        <p>
          <b>Detectors live nearby?</b> Choose Dark-room before you sign in. The screen then shows red light
          only.
        </p>
        <ThemeChoice large />
      </div>
      <p className="hs-quiet hs-sign-in-foot">{welcome.laboratory.name}. Halfsilver 1.0.</p>
    </section>
  )
}
