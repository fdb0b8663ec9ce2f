import compression from 'compression'
import cookieParser from 'cookie-parser'
import express, { type Express } from 'express'
import { clientFiles, clientPage } from './files/clientFiles.ts'
import { errorHandler } from './middleware/errors.ts'
import { permissionsPolicy, securityHeaders } from './middleware/headers.ts'
import { logRequests } from './middleware/logRequests.ts'
import { mountRoutes } from './routes/mount.ts'
import { routes as allRoutes } from './routes/index.ts'
import type { AnyRoute } from './routes/route.ts'
import type { Context } from './services/context.ts'
import { Refusal } from './services/refusal.ts'

/** Builds the app without listening. */
export function createApp(context: Context, routes: readonly AnyRoute[] = allRoutes): Express {
  const app = express()
  app.disable('x-powered-by')
  app.disable('etag')
  app.set('trust proxy', context.config.trustProxy)
  app.set('query parser', 'simple')

  app.use(logRequests(context.log))
  app.use(securityHeaders(context.config), permissionsPolicy)
  app.use(compression())
  app.use('/api', cookieParser())
  mountRoutes(app, context, routes)
  app.use('/api', () => {
    throw new Refusal('not-found')
  })

  app.use(clientFiles(context.config.clientDir), clientPage(context.config.clientDir))
  app.use(() => {
    throw new Refusal('not-found')
  })
  app.use(errorHandler(context.log))
  return app
}
