import { createHash } from 'node:crypto'
import { existsSync, readFileSync } from 'node:fs'
import type { RequestHandler } from 'express'
import helmet from 'helmet'
import { Problem } from '../../contract/problems.ts'
import type { Config } from '../config.ts'

/** Source expressions for the inline scripts of a built page (there is one: the theme before the first paint). */
export function inlineScriptHashes(pageFile: string): string[] {
  if (!existsSync(pageFile)) return []
  const page = readFileSync(pageFile, 'utf8')
  return [...page.matchAll(/<script>([\s\S]*?)<\/script>/g)].map(
    ([, text]) =>
      `'sha256-${createHash('sha256')
        .update(text ?? '')
        .digest('base64')}'`,
  )
}

/** The headers of every answer. The policy is that of threat B11. */
export function securityHeaders(config: Config, scriptHashes: string[]): RequestHandler[] {
  const https = config.origin.startsWith('https:')
  return [
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          'default-src': ["'none'"],
          'script-src': ["'self'", ...scriptHashes],
          'style-src': ["'self'"],
          'style-src-attr': ["'unsafe-inline'"],
          'img-src': ["'self'", 'blob:', 'data:'],
          'font-src': ["'self'"],
          'connect-src': ["'self'"],
          'worker-src': ["'self'"],
          'form-action': ["'self'"],
          'base-uri': ["'none'"],
          'frame-ancestors': ["'none'"],
        },
      },
      strictTransportSecurity: https ? { maxAge: 31_536_000, includeSubDomains: false } : false,
      referrerPolicy: { policy: 'same-origin' },
      xFrameOptions: { action: 'deny' },
    }),
    (_req, res, next) => {
      res.set(
        'Permissions-Policy',
        'camera=(), microphone=(), geolocation=(), payment=(), usb=(), serial=(), midi=()',
      )
      next()
    },
  ]
}

/** The interface's documentation page alone writes a style element and draws its arrows from data: URLs. */
export const documentationHeaders: RequestHandler = (_req, res, next) => {
  const policy = String(res.getHeader('Content-Security-Policy'))
  res.set('Content-Security-Policy', policy.replace("style-src 'self'", "style-src 'self' 'unsafe-inline'"))
  next()
}

/** Answers only under its own names, so that a foreign name pointed at this address reaches nothing (DNS rebinding). */
export function allowedHosts({ origin, port }: Config): RequestHandler {
  const own = new URL(origin).host
  const allowed = new Set([own, `127.0.0.1:${port}`])
  return (req, res, next) => {
    const host = req.headers.host ?? ''
    if (allowed.has(host)) return next()
    if (/^localhost(:\d+)?$/.test(host) && (req.method === 'GET' || req.method === 'HEAD')) {
      res.redirect(308, origin + req.originalUrl)
      return
    }
    throw new Problem('foreign-origin', `This address is not served here; use ${origin}.`)
  }
}

const safeMethods = ['GET', 'HEAD', 'OPTIONS']

/** Writes that a cookie authorises must come from a page of ours (ruling 20). Tokens need no such proof. */
export function ownOriginOnly({ origin }: Config): RequestHandler {
  return (req, _res, next) => {
    if (safeMethods.includes(req.method) || req.headers.authorization !== undefined) return next()
    const site = req.get('sec-fetch-site')
    if (req.headers.origin === origin && (site === undefined || site === 'same-origin')) return next()
    throw new Problem(
      'foreign-origin',
      `This request does not come from ${origin}; nothing was changed. Scripts use a token.`,
    )
  }
}

export const notStored: RequestHandler = (_req, res, next) => {
  res.set('Cache-Control', 'no-store')
  next()
}
