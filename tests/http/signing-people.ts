import type { Entry } from '../../server/contract/entries.ts'
import { endpoints, type EndpointName } from '../../server/contract/endpoints.ts'
import type { Meaning } from '../../server/contract/signatures.ts'
import { demoPassphrase } from '../../server/platform/identity/demo-accounts.ts'
import {
  fetchRecord,
  withSigningKey,
  type Presence,
  type SigningCalls,
} from '../../src/features/signatures/signing.ts'
import { ApiProblem, problemFrom } from '../../src/lib/api-problem.ts'
import { urlOf } from '../../src/lib/url-of.ts'
import { signIn, type Answer, type PersonClient } from '../support/session.ts'

/** The client's own signing module, its calls sent through a signed-in test client. */
export function callsOf(client: PersonClient): SigningCalls {
  async function send(
    name: EndpointName,
    options: { params?: object; query?: object; body?: unknown },
  ): Promise<Answer> {
    const path = urlOf(
      name,
      options.params as Record<string, string>,
      options.query as Record<string, string>,
    )
    const answer = await client.call(endpoints[name].method, path, options.body)
    if (answer.status >= 300) throw problemFrom(answer.status, answer.json)
    return answer
  }
  return {
    call: (async (name: EndpointName, options: object) =>
      (await send(name, options)).json) as SigningCalls['call'],
    callForBytes: (async (name: EndpointName, options: object) => {
      const { bytes, headers } = await send(name, options)
      return { bytes: new Uint8Array(bytes), headers }
    }) as SigningCalls['callForBytes'],
  }
}

export interface Signer {
  client: PersonClient
  calls: SigningCalls
  /** Base64 signature by the person's own key, unlocked once with the demo passphrase. */
  sign(bytes: Uint8Array): string
}

/** Signs in and unlocks the key once; the key stays open here so that a test with many signatures derives it once. */
export async function signerOf(url: string, login: string): Promise<Signer> {
  const client = await signIn(url, login)
  const calls = callsOf(client)
  const opened = await new Promise<{ sign: Signer['sign'] }>((resolve, reject) => {
    // The module overwrites the key when its callback ends, so the callback waits as long as the test process lives.
    withSigningKey(
      demoPassphrase,
      (sign) => new Promise<never>(() => resolve({ sign })),
      undefined,
      calls,
    ).catch(reject)
  })
  return { client, calls, sign: opened.sign }
}

/** Prepares, signs and hands in; answers the status of the last call, with its problem code if it failed. */
export async function sign(
  who: Signer,
  entryId: string,
  meaning: Meaning,
  presence?: Presence,
): Promise<{ status: number; code?: string; problem?: ApiProblem }> {
  try {
    const { bytes, sha256 } = await fetchRecord(entryId, meaning, presence, who.calls)
    const body = { meaning, recordSha256: sha256, signature: who.sign(bytes) }
    await who.calls.call('signEntry', { params: { id: entryId }, body })
    return { status: 201 }
  } catch (error) {
    if (!(error instanceof ApiProblem)) throw error
    return { status: error.status, code: error.code, problem: error }
  }
}

export const paragraph = (text: string) => ({ type: 'paragraph', content: [{ type: 'text', text }] })

export async function write(client: PersonClient, entryId: string, ...content: unknown[]): Promise<Answer> {
  return client.call('PUT', `entries/${entryId}/content`, { type: 'doc', content }, { 'if-match': '*' })
}

/** A notebook of the first person with the others as members. */
export async function notebookOf(
  keeper: PersonClient,
  title: string,
  members: Record<string, string>,
): Promise<string> {
  const { id } = await keeper.ok<{ id: string }>('POST', 'notebooks', { title })
  const { items } = await keeper.ok<{ items: { id: string; login: string }[] }>('GET', 'people')
  for (const [login, role] of Object.entries(members)) {
    const person = items.find((item) => item.login === login)
    await keeper.ok('PUT', `notebooks/${id}/members/${person?.id}`, { role })
  }
  return id
}

export async function newEntry(client: PersonClient, notebookId: string, title: string): Promise<string> {
  return (
    await client.ok<{ id: string }>('POST', `notebooks/${notebookId}/entries`, { title, experiment: 'hbt' })
  ).id
}

export const entryOf = (client: PersonClient, id: string) => client.ok<Entry>('GET', `entries/${id}`)
