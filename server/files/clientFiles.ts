import express, { type RequestHandler } from 'express'
import { join } from 'node:path'

const year_ms = 31_536_000_000

/** The built client: files whose names carry a hash are kept by browsers for good, the page itself never. */
export function clientFiles(folder: string): RequestHandler {
  return express.static(folder, {
    index: 'index.html',
    redirect: false,
    setHeaders(response, path) {
      const hashed = path.startsWith(join(folder, 'assets'))
      response.set('Cache-Control', hashed ? `public, max-age=${year_ms / 1000}, immutable` : 'no-cache')
    },
  })
}

/** Every address of the client is the one page, which finds its view itself. Missing files are not. */
export function clientPage(folder: string): RequestHandler {
  return (request, response, next) => {
    const isPage = (request.method === 'GET' || request.method === 'HEAD') && request.accepts('html') === 'html'
    if (!isPage || /\.[a-z0-9]+$/i.test(request.path)) {
      next()
      return
    }
    response.set('Cache-Control', 'no-cache')
    response.sendFile('index.html', { root: folder }, (error) => {
      if (error) next()
    })
  }
}
