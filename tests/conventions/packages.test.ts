import { describe, expect, it } from 'vitest'
import { readText } from '../helpers/tree.ts'

interface Manifest {
  engines: { node: string }
  dependencies: Record<string, string>
  devDependencies: Record<string, string>
}
interface Locked {
  version: string
  license?: string
  dev?: boolean
}

const manifest = JSON.parse(readText('package.json')) as Manifest
const lock = JSON.parse(readText('package-lock.json')) as { packages: Record<string, Locked> }
const wanted = Object.entries({ ...manifest.dependencies, ...manifest.devDependencies })

/** Majors from which these packages carry a commercial licence or ask for a newer Node.js than ours. */
const belowMajor = { primevue: 5, '@primeuix/themes': 3, primeicons: 8, 'vue-router': 5, vitest: 5 } as const

describe('packages', () => {
  it.each(wanted)('%s has an exact version (%s)', (_name, version) =>
    expect(version).toMatch(/^\d+\.\d+\.\d+(-[\w.]+)?$/),
  )

  it.each(wanted)('%s %s is what the lock file holds', (name, version) =>
    expect(lock.packages[`node_modules/${name}`]?.version).toBe(version),
  )

  it.each(Object.entries(belowMajor))('%s stays below major %i', (name, major) =>
    expect(Number(wanted.find(([wantedName]) => wantedName === name)?.[1].split('.')[0])).toBeLessThan(major),
  )
})
