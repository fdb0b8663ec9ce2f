import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { gzipSync } from 'node:zlib'
import { build, type Manifest } from 'vite'
import type { Figure } from './measure.ts'

const root = fileURLToPath(new URL('../../', import.meta.url))

/** Script that a page loads before it works: its chunk and all that these import at once, compressed by gzip. */
export async function scriptSizeRows(): Promise<Figure[]> {
  const out = mkdtempSync(join(tmpdir(), 'bayloom-sizes-'))
  try {
    await build({
      root,
      configFile: join(root, 'vite.config.ts'),
      logLevel: 'error',
      build: { outDir: out, emptyOutDir: true, manifest: true },
    })
    const manifest = JSON.parse(readFileSync(join(out, '.vite/manifest.json'), 'utf8')) as Manifest
    return [
      row(out, manifest, 'sign-in', 'src/views/SignInView.vue', 200),
      row(out, manifest, 'diagram', 'src/views/BuildView.vue', 450),
    ]
  } finally {
    rmSync(out, { recursive: true, force: true })
  }
}

function row(out: string, manifest: Manifest, page: string, view: string, most_kB: number): Figure {
  const chunks = new Set(['index.html', view])
  for (const chunk of chunks) for (const next of manifest[chunk]?.imports ?? []) chunks.add(next)
  const bytes = [...chunks].reduce((sum, chunk) => {
    const { file } = manifest[chunk] ?? {}
    if (file === undefined) throw new Error(`no chunk ${chunk} in the build`)
    return sum + gzipSync(readFileSync(join(out, file))).length
  }, 0)
  return {
    what: `script of the ${page}, compressed`,
    own: bytes / 1000,
    unit: 'kB',
    beside: `to stay under ${most_kB} kB`,
  }
}
