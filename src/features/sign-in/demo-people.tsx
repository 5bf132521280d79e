import type { z } from 'zod'
import type { welcomeSchema } from '../../../server/contract/people.ts'

type Demo = NonNullable<z.infer<typeof welcomeSchema>['demo']>

/** The invented people of the demonstration. The code host's stand-in asks which of them comes in. */
export function DemoPeople({ demo }: { demo: Demo }) {
  return (
    <div className="hs-demo-people">
      <p>
        <b>Demonstration.</b> The people and the data are invented. Choose one of them at the code host’s
        stand-in:
      </p>
      <dl className="hs-facts">
        {demo.people.map((person) => (
          <PersonRow key={person.login} {...person} />
        ))}
      </dl>
      <p>
        All sign with the passphrase <span className="hs-fig">{demo.passphrase}</span>
      </p>
    </div>
  )
}

function PersonRow({ login, name, role }: Demo['people'][number]) {
  return (
    <>
      <dt className="hs-fig">{login}</dt>
      <dd className="hs-words">
        {name}, {role}
      </dd>
    </>
  )
}
