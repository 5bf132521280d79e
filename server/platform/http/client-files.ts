import path from 'node:path'
import express, { Router } from 'express'

/** The built client: files named by their digest for ever, every page address the one page. */
export function clientFiles(folder: string): Router {
  const router = Router()
  router.use(
    '/assets',
    express.static(path.join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false }),
  )
  router.use(express.static(folder, { index: false, maxAge: 0 }))
  router.get('/*path', (req, res, next) => {
    if (path.extname(req.path) !== '' || !req.accepts('html')) return next()
    res.set('Cache-Control', 'no-cache').sendFile('index.html', { root: folder })
  })
  router.get('/', (_req, res) => {
    res.set('Cache-Control', 'no-cache').sendFile('index.html', { root: folder })
  })
  return router
}
