import helmet from 'helmet'
import type { RequestHandler } from 'express'
import type { Config } from '../config.ts'

/**
 * Headers that keep a page to itself. Scripts only ever come from files of ours. Styles are allowed inline: the
 * component library writes its theme into style elements while it runs, and the diagram places its nodes by style
 * attributes, which no nonce can cover.
 */
export function securityHeaders(config: Config): RequestHandler {
  const secure = config.publicUrl?.startsWith('https:') === true
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'"],
        scriptSrcAttr: ["'none'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        manifestSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(secure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: secure ? { maxAge: 31_536_000 } : false,
    referrerPolicy: { policy: 'same-origin' },
    crossOriginOpenerPolicy: { policy: 'same-origin' },
    crossOriginResourcePolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  })
}

/** Features of the browser that no page of ours asks for. */
export const permissionsPolicy: RequestHandler = (_request, response, next) => {
  response.set('Permissions-Policy', 'camera=(), geolocation=(), microphone=(), payment=(), usb=()')
  next()
}
