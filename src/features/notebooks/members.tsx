import { useState } from 'react'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { TextButton } from '../../ui/button.tsx'
import { Initials } from '../../ui/initials.tsx'
import { Message } from '../../ui/message.tsx'
import { AddMember } from './add-member.tsx'
import { useRemoveMember } from './mutations.ts'

/** Who writes, witnesses and reads in a notebook. Whoever keeps it adds people and ends memberships. */
export function Members({ notebook }: { notebook: Notebook }) {
  const keeps = notebook.allowed.includes('keep')
  const remove = useRemoveMember(notebook.id)
  const [ending, setEnding] = useState<string | null>(null)
  return (
    <>
      <ul className="hs-members">
        {notebook.members.map((member) => (
          <li key={member.personId}>
            <Initials name={member.name} small />
            <span>
              {member.name}
              <small>
                {member.role}
                {member.keeper && ', keeps the notebook'}
              </small>
            </span>
            {keeps && !member.keeper && ending !== member.personId && (
              <TextButton
                onClick={() => setEnding(member.personId)}
                aria-label={`End the membership of ${member.name}`}
              >
                End
              </TextButton>
            )}
            {ending === member.personId && (
              <span className="hs-members-sure">
                <TextButton
                  danger
                  onClick={() => remove.mutate(member.personId, { onSettled: () => setEnding(null) })}
                >
                  End the membership
                </TextButton>
                <TextButton onClick={() => setEnding(null)}>Keep it</TextButton>
              </span>
            )}
          </li>
        ))}
      </ul>
      {remove.isError && <Message kind="fault">{sentenceOf(remove.error)}</Message>}
      {keeps && <AddMember notebook={notebook} />}
    </>
  )
}
