import { Router } from 'express'
import swaggerUi from 'swagger-ui-express'
import { documentationHeaders } from './security.ts'

/** The human page of the interface, with all its assets from here. */
export function documentationPage(): Router {
  const router = Router()
  const options = { swaggerUrl: '/api/v1/openapi.json', validatorUrl: null, tryItOutEnabled: false }
  router.use(
    documentationHeaders,
    swaggerUi.serve,
    swaggerUi.setup(undefined, {
      swaggerOptions: options,
      swaggerUrl: options.swaggerUrl,
      customSiteTitle: 'Halfsilver interface',
    }),
  )
  return router
}
