import { useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { ApiProblem, sentenceOf } from '../../lib/api-problem.ts'
import { Block, BlockLine, BlockPart, type BlockState } from '../../ui/block.tsx'
import { Icon } from '../../ui/icon.tsx'
import { Message } from '../../ui/message.tsx'
import { BlockFoot } from './block-foot.tsx'
import { CalculationFigure, FigureLegend } from './calculation-figure.tsx'
import { FailureMessage } from './failure-message.tsx'
import type { JsonSchema } from './json-schema.ts'
import { KeyResults } from './key-results.tsx'
import { useRecompute } from './mutations.ts'
import { ParameterRow } from './parameter-row.tsx'
import { ProgressPart } from './progress-part.tsx'
import { calculationQuery, isGoingOn, kindsQuery } from './queries.ts'
import { useWatchCalculation } from './use-watch-calculation.ts'

interface CalculationBlockProps {
  calculationId: string
  /** The sheet is being written by this person: parameters and acts are open. */
  editable: boolean
  sealed: boolean
  /** Acts on the block's place in the text: move, remove. */
  placeActs?: ReactNode
  /** Other parameters make another calculation, which takes the place of this one in the text. */
  onSuccessor: (successorId: string) => void
}

/** A calculation in the text: how it stands, what goes in, the curve, the figures, and where they come from. */
export function CalculationBlock({ calculationId, ...rest }: CalculationBlockProps) {
  const { data: calculation, error } = useQuery(calculationQuery(calculationId))
  if (calculation) return <Loaded calculation={calculation} {...rest} />
  if (error) return <Missing error={error} placeActs={rest.placeActs} />
  return <Block state="queued" number="" title="Opening the calculation" label="Calculation" />
}

function Loaded(props: { calculation: Calculation } & Omit<CalculationBlockProps, 'calculationId'>) {
  const { calculation, editable, sealed, placeActs, onSuccessor } = props
  const { id, entryId, label, status, progress } = calculation
  const goingOn = isGoingOn(status)
  useWatchCalculation(id, entryId, goingOn)
  const { data: kinds } = useQuery(kindsQuery)
  const recompute = useRecompute(id, onSuccessor)
  const kind = kinds?.items.find((each) => each.kind === calculation.kind)
  const title = kind?.title ?? calculation.kind
  const state = stateOf(calculation, sealed)
  const refused = recompute.error instanceof ApiProblem ? recompute.error : null
  const fieldErrors = [...(refused?.errors ?? []), ...(status === 'failed' ? errorsOf(calculation) : [])]
  // What was asked for stays in the fields while it is on its way, and while it is refused.
  const asked = recompute.isPending || refused?.errors.length ? recompute.variables : undefined
  const away = refused !== null && refused.errors.length === 0
  return (
    <Block
      state={state}
      number={label}
      title={title}
      label={`Calculation ${label}, ${title}`}
      share={progress && progress.of > 0 ? progress.done / progress.of : null}
    >
      <BlockLine>
        <Inputs calculation={calculation} />
        <FigureLegend calculation={calculation} />
      </BlockLine>
      {kind && (
        <ParameterRow
          schema={kind.parameters as JsonSchema}
          parameters={asked ?? calculation.parameters}
          disabled={!editable || goingOn || recompute.isPending}
          errors={fieldErrors}
          onChange={(parameters) => recompute.mutate(parameters)}
        />
      )}
      {away && <Message kind="fault">{sentenceOf(refused)}</Message>}
      {goingOn && <ProgressPart calculation={calculation} editable={editable} />}
      {state === 'stale' && (
        <Message kind="warn" title="Out of date.">
          An input was read anew or has changed since this was computed. Recompute to bring the figures up to
          date.
        </Message>
      )}
      <FailureMessage calculation={calculation} />
      <CalculationFigure calculation={calculation} />
      <KeyResults figures={calculation.figures} stale={state === 'stale'} />
      {calculation.notes.map((note) => (
        <Message key={note.code + note.detail} kind="warn">
          {note.detail}
        </Message>
      ))}
      <BlockFoot
        calculation={calculation}
        placeActs={placeActs}
        onRecompute={editable && !goingOn ? () => recompute.mutate(calculation.parameters) : null}
      />
    </Block>
  )
}

function Inputs({ calculation }: { calculation: Calculation }) {
  if (calculation.inputs.length === 0)
    return <span className="hs-quiet">no input: computed from the parameters alone</span>
  return calculation.inputs.map((input) => (
    <span
      className="hs-input-name"
      key={'fileId' in input ? input.fileId : input.calculationId + input.pointer}
    >
      <Icon name="trace" size={15} />
      {'fileId' in input ? input.name : `result ${input.pointer} of another calculation`}
    </span>
  ))
}

function Missing({ error, placeActs }: { error: Error; placeActs: ReactNode }) {
  return (
    <Block state="failed" number="" title="Calculation" label="Calculation that cannot be shown">
      <Message kind="fault">{sentenceOf(error)}</Message>
      <BlockPart>{placeActs}</BlockPart>
    </Block>
  )
}

/** How a block stands. One that was stopped shows as failed, with the way on beside it. */
function stateOf({ status, stale }: Calculation, sealed: boolean): BlockState {
  if (status === 'queued' || status === 'running') return status
  if (status === 'failed' || status === 'cancelled') return 'failed'
  if (stale) return 'stale'
  return sealed ? 'sealed' : 'done'
}

function errorsOf({ error }: Calculation): { pointer: string; detail: string }[] {
  return error?.errors ?? []
}
