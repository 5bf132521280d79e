import { useState } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { TextField } from '../../../ui/field.tsx'
import { useLateRemark } from '../mutations.ts'

/** The remark that a gap between work and writing asks for, given where it is missed. */
export function LateRemark({ entryId, onKept }: { entryId: string; onKept: () => void }) {
  const [remark, setRemark] = useState('')
  const keep = useLateRemark(entryId)
  return (
    <div className="mt-2 grid gap-2">
      <TextField
        label="Why it was written later, or earlier"
        value={remark}
        maxLength={2000}
        error={keep.error ? sentenceOf(keep.error) : null}
        onChange={(event) => setRemark(event.target.value)}
      />
      <div>
        <Button
          size="small"
          busy={keep.isPending}
          disabledReason={remark.trim() === '' ? 'Write the remark first.' : null}
          onClick={() => keep.mutate(remark.trim(), { onSuccess: onKept })}
        >
          Keep remark
        </Button>
      </div>
    </div>
  )
}
