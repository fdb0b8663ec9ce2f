import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { extname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import vue from '@vitejs/plugin-vue'
import { chromium, type Browser, type Page } from 'playwright-core'
import { build } from 'vite'
import { readBuildText } from '#shared/build/read.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { findChromium } from '../../server/setup/programs.mjs'
import type { CanvasBench, FrameTimes } from './canvas/bench.ts'
import type { Row } from './measure.ts'

const folder = fileURLToPath(new URL('./canvas/', import.meta.url))
const example = new URL('../../examples/stress-60/build.json', import.meta.url)
const origin = 'http://bench.invalid'
const types: Readonly<Record<string, string>> = { '.html': 'text/html', '.js': 'text/javascript', '.css': 'text/css' }
const flags = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking']
const rounds = 3
const frames = 120

const middle = (values: readonly number[], share = 0.5): number =>
  [...values].sort((a, b) => a - b)[Math.floor(values.length * share)] ?? NaN

/** Dragging, panning and editing on the sixty-drive sheet, beside the bare library with as many plain nodes and edges. */
export async function canvasRows(): Promise<Row[]> {
  const out = mkdtempSync(join(tmpdir(), 'bayloom-canvas-'))
  await build({
    root: folder,
    configFile: false,
    logLevel: 'error',
    plugins: [vue()],
    build: { outDir: out, emptyOutDir: true, target: 'es2022', rolldownOptions: { input: join(folder, 'page.html') } },
  })
  const browser = await chromium.launch({ executablePath: findChromium() ?? 'chromium', args: flags })
  try {
    return await measure(browser, out)
  } finally {
    await browser.close()
    rmSync(out, { recursive: true, force: true })
  }
}

async function measure(browser: Browser, out: string): Promise<Row[]> {
  const times = { own: { drag: [], pan: [] }, bare: { drag: [], pan: [] } } as Record<
    'own' | 'bare',
    Record<'drag' | 'pan', FrameTimes[]>
  >
  const edits: number[] = []
  let size = { nodes: 0, runs: 0 }
  for (let round = 0; round < rounds; round++)
    for (const what of ['bare', 'own'] as const) {
      const page = await openPage(browser, out)
      size = await mountOn(page, what)
      for (const act of ['drag', 'pan'] as const) times[what][act].push(await timeOn(page, act))
      if (what === 'own') edits.push(...(await page.evaluate(() => benchOf().timeEdit(15))))
      await page.close()
    }
  const rows = (['drag', 'pan'] as const).flatMap((act): Row[] => {
    const all = (what: 'own' | 'bare', kind: 'frame' | 'work') => times[what][act].flatMap((one) => one[kind])
    const [own, bare] = [middle(all('own', 'work')), middle(all('bare', 'work'))]
    const [ownFrame, bareFrame] = [middle(all('own', 'frame')), middle(all('bare', 'frame'))]
    const title = act === 'drag' ? 'drag a part' : 'pan the sheet'
    return [
      {
        what: `${title}, ${size.nodes} nodes, ${size.runs} runs: frame`,
        own_ms: ownFrame,
        beside: `bare library ${bareFrame.toFixed(1)} ms; slowest twentieth ${middle(all('own', 'frame'), 0.95).toFixed(1)} against ${middle(all('bare', 'frame'), 0.95).toFixed(1)} ms`,
      },
      { what: `${title}: script, style and layout`, own_ms: own, beside: `bare library ${bare.toFixed(2)} ms` },
    ]
  })
  return [...rows, { what: 'edit to canvas, without the check', own_ms: middle(edits), beside: '' }]
}

/** Put there by the page. */
declare function benchOf(): CanvasBench

async function openPage(browser: Browser, out: string): Promise<Page> {
  const page = await browser.newPage({ viewport: { width: 1200, height: 800 } })
  await page.route(`${origin}/**`, (route) => {
    const { pathname } = new URL(route.request().url())
    const type = types[extname(pathname)]
    return type ? route.fulfill({ contentType: type, body: readFileSync(join(out, pathname)) }) : route.abort()
  })
  await page.goto(`${origin}/page.html`)
  await page.waitForFunction(() => 'benchOf' in globalThis)
  return page
}

function mountOn(page: Page, what: 'own' | 'bare') {
  const catalog = loadCatalogFiles()
  const read = readBuildText(readFileSync(example, 'utf8'), indexCatalog(catalog))
  if (!read.ok) throw new Error(JSON.stringify(read.problems))
  const data = { what, document: read.document, catalog }
  return page.evaluate(({ what, document, catalog }) => benchOf().mount(what, document, catalog), data)
}

const timeOn = (page: Page, act: 'drag' | 'pan') =>
  page.evaluate(({ act, frames }) => benchOf().time(act, frames), { act, frames })
