import type { z } from 'zod'
import type { Figure } from '../contract/figure.ts'
import type { TagRecord } from '../contract/tag-record.ts'

export type InputForm = 'tags' | 'histogram' | 'table'

/** A remark on the quality of a result; the code is fixed, the sentence names the figure that triggered it. */
export interface Note {
  code: string
  detail: string
}

export interface ComputeInput {
  record: TagRecord
}

export interface ComputeTask<Parameters = unknown> {
  /** As parsed by the definition's schema: defaults are filled in. */
  parameters: Parameters
  inputs: ComputeInput[]
  /** Called between pieces of work; it may throw to stop the computation. */
  progress?: (done: number, of: number) => void
}

export interface Computed<Result = unknown> {
  /** Plain JSON: finite numbers, null where there is none, picoseconds beyond 2^53 as text; order of members is fixed. */
  result: Result
  notes: Note[]
}

/** A figure that a result reports, by JSON pointer. */
export interface FigurePointer {
  pointer: string
  label: string
}

export interface KindModule {
  compute(task: ComputeTask): Computed
}

export interface KindFigureModule {
  /** The picture of a result as data; null where there is nothing to draw. */
  figure(result: unknown, parameters: unknown): Figure | null
}

/** One kind of calculation. A changed formula is a new version; old versions stay callable. */
export interface KindDefinition {
  kind: string
  version: number
  title: string
  /** One sentence for the person who chooses. */
  summary: string
  inputs: { min: number; max: number; accepts: InputForm[] }
  parameters: z.ZodType<Record<string, unknown>>
  result: z.ZodType
  example: { parameters: Record<string, unknown> }
  /** What the result reports, in order (definitions.md, end). */
  figures(result: unknown): FigurePointer[]
  load(): Promise<KindModule>
  loadFigure(): Promise<KindFigureModule>
}
