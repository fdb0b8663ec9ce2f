import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { makeClient, startApi, type Api } from './support/api.ts'

const folder = mkdtempSync(join(tmpdir(), 'bayloom-client-'))
let api: Api
beforeAll(async () => {
  mkdirSync(join(folder, 'assets'))
  writeFileSync(join(folder, 'index.html'), '<!doctype html><title>Page</title>')
  writeFileSync(join(folder, 'assets', 'main-abc123.js'), 'export {}')
  writeFileSync(join(folder, '.hidden'), 'no')
  api = await startApi({ settings: { CLIENT_DIR: folder } })
})
afterAll(async () => {
  await api.close()
  rmSync(folder, { recursive: true })
})

const html = { accept: 'text/html,*/*' }
const get = (path: string, headers = html) => makeClient(api.url).get(path, headers)

test.each(['/', '/builds/0d3a0000-0000-4000-8000-000000000001', '/sign-in?next=/x', '/index.html'])(
  '%s is the page, asked for anew each time',
  async (path) => {
    const response = await get(path)
    expect(response.text).toContain('<title>Page</title>')
    expect(response.headers['cache-control']).toBe('no-cache')
    expect(response.headers['content-security-policy']).toContain("script-src 'self'")
  },
)

test('a file with a hash in its name is kept for good', async () => {
  const response = await get('/assets/main-abc123.js')
  expect(response.headers['cache-control']).toBe('public, max-age=31536000, immutable')
})

test.each(['/assets/gone.js', '/.hidden', '/api/gone'])('%s is not there', async (path) => {
  expect((await get(path)).status).toBe(404)
})

test('an address that climbs out of the folder leads to the page', async () => {
  const response = await get('/..%2f..%2f..%2f..%2f..%2f..%2fetc%2fpasswd')
  expect(response.text).toBe('<!doctype html><title>Page</title>')
})

test('other requests than reading get no page', async () => {
  expect((await makeClient(api.url).post('/builds', {})).status).toBe(404)
})
