import { z } from 'zod'
import {
  countForm,
  decimalForm,
  entryNumberForm,
  freeForm,
  hexForm,
  idForm,
  integerTextForm,
  schemaName,
  textForm,
  timeForm,
} from './forms.ts'

/*
 * The body of record.json: all that every signer of an entry signs alike (shapes 1). Members are never left out; where there
 * is nothing to say they are null, lists are empty.
 */

const quantity = { name: textForm, value: decimalForm, u: decimalForm.nullable(), unit: textForm.nullable() }
const digests = { recordSha256: hexForm, signatureSha256: hexForm }

const author = z.strictObject({
  subjectId: idForm,
  name: textForm,
  revisions: z.array(countForm),
  exception: z.strictObject({ reason: textForm, bySubjectId: idForm, time: timeForm }).nullable(),
})

export const contributions = ['run', 'file', 'reading', 'calculation'] as const
const contributor = z.strictObject({
  subjectId: idForm,
  name: textForm,
  acts: z.array(z.enum(contributions)),
})

const apparatus = z.strictObject({
  id: idForm,
  version: countForm,
  kind: textForm,
  name: textForm,
  role: textForm.nullable(),
  channel: z.int().min(0).nullable(),
  figures: z.array(z.strictObject({ ...quantity, calibrationId: idForm.nullable() })),
})

const run = z.strictObject({
  id: idForm,
  number: z.string().regex(/^R-\d+$/, 'not a run number such as R-0612'),
  experiment: textForm,
  startedAt: timeForm,
  durationPs: integerTextForm.nullable(),
  conditions: z.array(z.strictObject(quantity)),
  apparatus: z.array(apparatus),
  cautions: z.array(z.strictObject({ code: textForm, acknowledgedBy: idForm, time: timeForm })),
})

const file = z.strictObject({
  id: idForm,
  runId: idForm.nullable(),
  name: textForm,
  size: integerTextForm,
  sha256: hexForm,
  uploadedBy: idForm,
  uploadedAt: timeForm,
  via: z.enum(['browser', 'token']),
  reading: z
    .strictObject({ format: textForm, version: countForm, options: freeForm, sha256: hexForm })
    .nullable(),
})

const homeEntry = z.strictObject({ entryId: idForm, number: entryNumberForm }).nullable()
const fileInput = z.strictObject({ fileId: idForm, sha256: hexForm, readingSha256: hexForm, homeEntry })
const resultInput = z.strictObject({
  calculationId: idForm,
  resultSha256: hexForm,
  pointer: z.string(),
  homeEntry,
})

const calculation = z.strictObject({
  id: idForm,
  label: z.string().regex(/^C[1-9]\d*$/, 'not a label such as C1'),
  kind: textForm,
  version: countForm,
  engine: textForm,
  parameters: freeForm,
  inputs: z.array(z.union([fileInput, resultInput])),
  resultSha256: hexForm,
  finishedAt: timeForm,
  figures: z.array(
    z.strictObject({
      pointer: z.string(),
      label: textForm,
      value: decimalForm,
      u: decimalForm.nullable(),
      unit: textForm.nullable(),
    }),
  ),
  notes: z.array(
    z.strictObject({ code: textForm, detail: textForm.nullable(), answer: textForm.nullable() }),
  ),
})

export const bodyForm = z.strictObject({
  schema: schemaName('record/1'),
  laboratory: z.strictObject({ id: idForm, name: textForm, demo: z.boolean() }),
  notebook: z.strictObject({ id: idForm, number: z.string().regex(/^N-\d+$/), title: textForm }),
  entry: z.strictObject({
    id: idForm,
    number: entryNumberForm,
    title: textForm,
    experiment: textForm,
    revision: countForm,
    workDate: z.string().regex(/^\d{4}-\d\d-\d\d$/),
    writtenFrom: timeForm.nullable(),
    writtenTo: timeForm.nullable(),
    lateRemark: textForm.nullable(),
    important: z.boolean(),
    witnessesRequired: countForm,
    amends: z.strictObject({ entryId: idForm, number: entryNumberForm, bodySha256: hexForm }).nullable(),
  }),
  authors: z.array(author),
  contributors: z.array(contributor),
  content: freeForm,
  contentSha256: hexForm,
  runs: z.array(run),
  files: z.array(file),
  calculations: z.array(calculation),
  quotes: z.array(
    z.strictObject({ nodeId: textForm, calculationId: idForm, pointer: z.string(), shown: textForm }),
  ),
  history: z.strictObject({
    returns: z.array(z.strictObject({ bySubjectId: idForm, reason: textForm.nullable(), time: timeForm })),
    voided: z.array(z.strictObject({ ...digests, time: timeForm })),
  }),
})
export type RecordBody = z.infer<typeof bodyForm>
export type RecordFile = z.infer<typeof file>
export type RecordCalculation = z.infer<typeof calculation>
