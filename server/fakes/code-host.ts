import { createHash, randomBytes } from 'node:crypto'
import express, { type Express, type Request, type RequestHandler } from 'express'
import { demoAccounts, type DemoAccount } from '../platform/identity/demo-accounts.ts'
import { escapeHtml, page, pageHeaders } from './html.ts'

/*
 * A stand-in for the code host people sign in with: its OAuth web flow (RFC 6749 section 4.1) with PKCE (RFC 7636) and the
 * two calls that say who somebody is. Account ids are numbers, as at the real one.
 */

interface Grant {
  account: DemoAccount
  redirectUri: string
  scope: string
  challenge: string | null
  expiresAt: number
}

const CODE_LIFE_MS = 10 * 60_000

export interface CodeHostSettings {
  clientId: string
  clientSecret: string
  accounts?: readonly DemoAccount[]
}

export function codeHost({ clientId, clientSecret, accounts = demoAccounts }: CodeHostSettings): Express {
  const codes = new Map<string, Grant>()
  const tokens = new Map<string, DemoAccount>()
  const app = express()
  app.disable('x-powered-by')
  app.use(express.urlencoded({ extended: false }))

  app.get('/login/oauth/authorize', (req, res) => {
    const asked = authorisation(req, clientId)
    if (typeof asked === 'string')
      return void res
        .status(400)
        .set(pageHeaders)
        .send(page('Cannot sign in', escapeHtml(asked)))
    const login = text(req.query.login)
    if (login === null) return void res.set(pageHeaders).send(choicePage(req, accounts))
    const target = new URL(asked.redirectUri)
    if (asked.state !== null) target.searchParams.set('state', asked.state)
    const account = accounts.find((one) => one.login === login)
    if (account) {
      const code = randomBytes(16).toString('hex')
      codes.set(code, { ...asked, account, expiresAt: Date.now() + CODE_LIFE_MS })
      target.searchParams.set('code', code)
    } else {
      target.searchParams.set('error', 'access_denied')
    }
    res.redirect(302, target.href)
  })

  app.post('/login/oauth/access_token', (req, res) => {
    const sent = req.body as Record<string, string | undefined>
    const grant = codes.get(sent.code ?? '')
    codes.delete(sent.code ?? '')
    const refused = (error: string) =>
      void res.json({ error, error_description: 'The code is incorrect, used or expired.' })
    if (sent.client_id !== clientId || sent.client_secret !== clientSecret)
      return refused('incorrect_client_credentials')
    if (!grant || grant.expiresAt < Date.now()) return refused('bad_verification_code')
    if (sent.redirect_uri !== undefined && sent.redirect_uri !== grant.redirectUri)
      return refused('redirect_uri_mismatch')
    if (grant.challenge !== null && challengeOf(sent.code_verifier ?? '') !== grant.challenge)
      return refused('bad_verification_code')
    const token = randomBytes(20).toString('hex')
    tokens.set(token, grant.account)
    res.json({ access_token: token, scope: grant.scope, token_type: 'bearer' })
  })

  const known: RequestHandler = (req, res, next) => {
    const account = tokens.get((req.get('authorization') ?? '').replace(/^(bearer|token) /i, ''))
    if (!account) return void res.status(401).json({ message: 'Bad credentials' })
    res.locals.account = account
    next()
  }
  app.get('/user', known, (_req, res) => {
    const { accountId, login, name } = res.locals.account as DemoAccount
    res.json({ id: accountId, login, name, email: null, type: 'User' })
  })
  app.get('/user/emails', known, (_req, res) => {
    const { email } = res.locals.account as DemoAccount
    res.json([{ email, primary: true, verified: true, visibility: 'private' }])
  })
  return app
}

/** What an authorise request asks for, or a sentence why it cannot be answered. */
function authorisation({ query }: Request, clientId: string) {
  const redirectUri = text(query.redirect_uri)
  if (query.client_id !== clientId) return 'The application is not registered here (client_id).'
  if (query.response_type !== undefined && query.response_type !== 'code')
    return 'Only response_type=code is known here.'
  if (redirectUri === null || !/^https?:/.test(redirectUri) || !URL.canParse(redirectUri))
    return 'The redirect_uri is not an address.'
  const challenge = text(query.code_challenge)
  if (challenge !== null && query.code_challenge_method !== 'S256')
    return 'Only the PKCE method S256 is known here.'
  return { redirectUri, scope: text(query.scope) ?? '', state: text(query.state), challenge }
}

/** RFC 7636 section 4.2, S256. */
function challengeOf(verifier: string): string {
  return createHash('sha256').update(verifier).digest('base64url')
}

function choicePage(req: Request, accounts: readonly DemoAccount[]): string {
  const link = ({ login, name, role }: DemoAccount) => {
    const href = `${req.originalUrl}&login=${encodeURIComponent(login)}`
    return `<li><a href="${escapeHtml(href)}">${escapeHtml(name)}</a> <small>${escapeHtml(login)}, ${role}</small></li>`
  }
  return page(
    'Sign in as',
    `<p>This page stands in for the code host. Nothing leaves this machine, and no password is asked.</p>
<ul>${accounts.map(link).join('\n')}</ul>
<p><a href="${escapeHtml(`${req.originalUrl}&login=-`)}">None of these: go back</a></p>`,
  )
}

function text(value: unknown): string | null {
  return typeof value === 'string' ? value : null
}
