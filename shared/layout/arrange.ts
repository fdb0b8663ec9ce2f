import type { ResolvedBuild } from '../build/resolve.ts'
import { spreadBends } from './bends.ts'
import { boundsOf } from './bounds.ts'
import { regionOf } from './carries.ts'
import type { Drawing } from './drawing.ts'
import { placeDataLoom } from './dataLoom.ts'
import { facingOf, hostDistances } from './facing.ts'
import { applyOwnPositions } from './positions.ts'
import { placePowerLoom } from './powerLoom.ts'
import { makePowerTag, makeStubs, type LoomNode } from './powerNodes.ts'
import { makeRuns } from './runs.ts'
import { placeStrips } from './strips.ts'
import { makeTag, noPlaces } from './tag.ts'

/**
 * The automatic arrangement of a build: strip of bays in the middle, power loom on the left, data loom on the right.
 * A part's own position wins over the automatic one. The same build always gives the same drawing.
 */
export function arrange(build: ResolvedBuild): Drawing {
  const places = noPlaces()
  const strips = placeStrips(build, places)
  const distances = hostDistances(build)
  const power: LoomNode[] = []
  const data: LoomNode[] = []
  for (const part of build.parts) {
    const region = regionOf(part)
    if (region === 'power') power.push(makePowerTag(places, part))
    if (region !== 'data') continue
    const { left, right } = facingOf(part, distances)
    data.push({ part, node: makeTag(places, part, 'data', left, right) })
    power.push(...makeStubs(places, part))
  }
  const runs = makeRuns(build, places)
  const bounds = boundsOf(strips)
  placePowerLoom(power, runs, bounds)
  placeDataLoom(data, runs, bounds)
  spreadBends(runs)

  const nodes = [...strips, ...power.map(({ node }) => node), ...data.map(({ node }) => node)]
  const drawing: Drawing = { nodes, runs: runs.map(({ run }) => run), bounds }
  applyOwnPositions(build, drawing)
  drawing.bounds = boundsOf(nodes)
  return drawing
}
