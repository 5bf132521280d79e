import { Router, type Request, type Response } from 'express'
import passport from 'passport'
import { Strategy, type Profile } from 'passport-github2'
import type { Services } from '../services.ts'
import { returnPath } from './return-path.ts'
import { startSession } from './session.ts'

/** Whose account ids these are; with the id they bind a person. The login is a label and may change hands (ruling 25). */
export const identityProvider = 'github'

export type SignInFailure = 'unknown-account' | 'closed-account' | 'not-completed'

export interface SignInEvents {
  /** Called inside the request, before the answer: a sign-in that cannot be recorded does not happen. */
  onSignIn(personId: string): Promise<void>
}

/** `/auth/github` and its callback. What went wrong is said on the sign-in page, by the code in its address. */
export function signInRoutes(services: Services, { onSignIn }: SignInEvents): Router {
  const { config, db, clock, log } = services
  const strategy = new Strategy(
    {
      clientID: config.oauth.clientId,
      clientSecret: config.oauth.clientSecret,
      callbackURL: `${config.origin}/auth/github/callback`,
      authorizationURL: config.oauth.authorizeUrl,
      tokenURL: config.oauth.tokenUrl,
      userProfileURL: config.oauth.profileUrl,
      userEmailURL: config.oauth.emailsUrl,
      scope: ['user:email'],
      userAgent: 'halfsilver',
      // Against forged and replayed answers: a state bound to the session, and PKCE. The types lack both options.
      ...{ state: true as unknown as string, pkce: true, allRawEmails: true },
    },
    (
      _accessToken: string,
      _refreshToken: string,
      profile: Profile,
      done: (error: unknown, user?: object) => void,
    ) => done(null, { accountId: String(profile.id), login: profile.username ?? '' }),
  )

  // passport keeps a request's outcome on the strategy it is given: one object for all would hand a person's sign-in to
  // whoever signs in at the same moment.
  const forOneRequest = () => Object.create(strategy) as Strategy

  async function finish(req: Request, res: Response, account: { accountId: string; login: string }) {
    const person = await db.row<{ id: string; active: boolean }>(
      'select id, active from work.people where provider = :provider and provider_account_id = :id',
      { provider: identityProvider, id: account.accountId },
    )
    if (!person)
      return refuse(res, 'unknown-account', `account ${account.accountId} (${account.login}) is nobody here`)
    if (!person.active) return refuse(res, 'closed-account', `account ${account.accountId} is closed`)
    const target = returnPath(req.session.returnTo, config.origin)
    await onSignIn(person.id)
    await startSession(req, person.id, clock.now())
    req.session.save((error) => {
      if (error) return refuse(res, 'not-completed', error)
      res.redirect(target)
    })
  }

  function refuse(res: Response, failure: SignInFailure, reason: unknown) {
    log.warn({ failure, reason: reason instanceof Error ? reason.message : reason }, 'sign-in refused')
    res.redirect(`/sign-in?failed=${failure}`)
  }

  const router = Router()
  router.get('/github', (req, res, next) => {
    req.session.returnTo = returnPath(req.query.returnTo, config.origin)
    passport.authenticate(forOneRequest(), { session: false })(req, res, next)
  })
  router.get('/github/callback', (req, res, next) => {
    const finished = (error: unknown, account: unknown, info: unknown) => {
      if (error || !account)
        return refuse(res, 'not-completed', error ?? (info as { message?: string } | undefined)?.message)
      finish(req, res, account as { accountId: string; login: string }).catch(next)
    }
    passport.authenticate(forOneRequest(), { session: false }, finished)(req, res, next)
  })
  return router
}
