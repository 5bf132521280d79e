import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { byId, idSchema, listOf, pageQuerySchema, roleSchema, timeSchema } from './common.ts'

export const memberSchema = z.object({
  personId: idSchema,
  login: z.string(),
  name: z.string(),
  role: roleSchema,
  keeper: z.boolean(),
})

export const notebookSchema = z.object({
  id: idSchema,
  number: z.string(),
  title: z.string(),
  witnessesRequired: z.number().int(),
  createdAt: timeSchema,
  entries: z.number().int(),
  members: z.array(memberSchema),
  /** What the caller may do here. */
  allowed: z.array(z.enum(['write', 'keep', 'witness', 'export'])),
})
export type Notebook = z.infer<typeof notebookSchema>

const title = z.string().trim().min(1, 'Give the notebook a title.').max(200)

export const notebookEndpoints = {
  listNotebooks: endpoint({
    method: 'GET',
    path: '/notebooks',
    summary: 'Notebooks the caller may read',
    tag: 'Notebooks',
    query: pageQuerySchema,
    reply: listOf(notebookSchema),
  }),
  createNotebook: endpoint({
    method: 'POST',
    path: '/notebooks',
    summary: 'A new notebook, kept by whoever creates it',
    tag: 'Notebooks',
    token: 'record',
    body: z.strictObject({ title }),
    reply: notebookSchema,
    status: 201,
  }),
  getNotebook: endpoint({
    method: 'GET',
    path: '/notebooks/:id',
    summary: 'One notebook',
    tag: 'Notebooks',
    params: byId,
    reply: notebookSchema,
  }),
  changeNotebook: endpoint({
    method: 'PATCH',
    path: '/notebooks/:id',
    summary: 'Rename a notebook',
    tag: 'Notebooks',
    params: byId,
    body: z.strictObject({ title }),
    reply: notebookSchema,
  }),
  setMember: endpoint({
    method: 'PUT',
    path: '/notebooks/:id/members/:personId',
    summary: 'Add a person, only in a role they hold in the laboratory',
    tag: 'Notebooks',
    params: z.object({ id: idSchema, personId: idSchema }),
    body: z.strictObject({ role: roleSchema }),
    reply: notebookSchema,
  }),
  removeMember: endpoint({
    method: 'DELETE',
    path: '/notebooks/:id/members/:personId',
    summary: 'End a membership',
    tag: 'Notebooks',
    params: z.object({ id: idSchema, personId: idSchema }),
    reply: null,
    status: 204,
  }),
}
