import { expect, inject, test } from 'vitest'
import { signIn } from '../support/session.ts'

// A signature is worth what the session behind it is: the account that signed in and no other (21 CFR 11.200).

test('people who sign in at the same moment each get their own session', async () => {
  const logins = ['maren', 'teo', 'farid', 'bram', 'noor', 'maren', 'farid', 'teo', 'noor', 'bram']
  const clients = await Promise.all(logins.map((login) => signIn(inject('url'), login)))
  const sessions = await Promise.all(
    clients.map((client) => client.ok<{ person: { login: string } }>('GET', 'session')),
  )
  expect(sessions.map(({ person }) => person.login)).toEqual(logins)
})
