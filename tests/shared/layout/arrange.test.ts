import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { carriesOf, regionOf } from '#shared/layout/carries.ts'
import type { Drawing, DrawnNode } from '#shared/layout/drawing.ts'
import { backplanes, manyDrives, tenDrives } from './sampleBuilds.ts'
import { buildOf } from './smallCatalog.ts'
import { wildBuild } from './wildBuild.ts'

const overlaps = (a: DrawnNode, b: DrawnNode): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height

const contains = (outer: DrawnNode, inner: DrawnNode): boolean =>
  outer.x <= inner.x &&
  outer.y <= inner.y &&
  inner.x + inner.width <= outer.x + outer.width &&
  inner.y + inner.height <= outer.y + outer.height

/** Pairs that lie over each other without one being the frame of the other. */
function clashes({ nodes }: Drawing): string[] {
  const isFrame = (node: DrawnNode) => node.kind === 'case' || node.kind === 'backplane'
  return nodes.flatMap((a, i) =>
    nodes
      .slice(i + 1)
      .filter((b) => overlaps(a, b) && !((isFrame(a) && contains(a, b)) || (isFrame(b) && contains(b, a))))
      .map((b) => `${a.id} over ${b.id}`),
  )
}

/** Every connector as often as it must be drawn: once, or once a side where it carries both. */
function connectorCounts(build: ResolvedBuild): Map<string, number> {
  return new Map(
    build.connectors.map((connector) => {
      const twice = carriesOf(connector) === 'both' && regionOf(connector.part) !== 'power'
      return [`${connector.part.part.id}.${connector.connector.id}`, twice ? 2 : 1]
    }),
  )
}

function drawnCounts({ nodes }: Drawing): Map<string, number> {
  const counts = new Map<string, number>()
  for (const node of nodes)
    for (const port of node.ports) {
      const key = `${node.part}.${port.connector}`
      counts.set(key, (counts.get(key) ?? 0) + 1)
    }
  return counts
}

const samples = { tenDrives: tenDrives(), backplanes: backplanes(), sixtyDrives: manyDrives(60) }

describe.each(Object.entries(samples))('%s', (_, build) => {
  const drawing = arrange(build)
  const node = (id: string) => drawing.nodes.find((one) => one.id === id)

  it('lays nothing over anything', () => expect(clashes(drawing)).toEqual([]))

  it('draws every connector', () =>
    expect([...drawnCounts(drawing)].sort()).toEqual([...connectorCounts(build)].sort()))

  it('draws one run for every joint, with both ends on ports that are there', () => {
    expect(drawing.runs.filter((run) => run.id === run.joint).map((run) => run.joint)).toEqual(
      build.joints.map(({ joint }) => joint.id),
    )
    for (const { from, to } of drawing.runs)
      for (const end of [from, to]) expect(node(end.node)?.ports.map((port) => port.key)).toContain(end.port)
  })

  it('gives every run and node its own id', () => {
    expect(new Set(drawing.runs.map((run) => run.id)).size).toBe(drawing.runs.length)
    expect(new Set(drawing.nodes.map((one) => one.id)).size).toBe(drawing.nodes.length)
  })

  it('keeps power left of the strip or below it, and data right of it', () => {
    const rows = drawing.nodes.filter((one) => one.kind === 'drive-row')
    const left = Math.min(...rows.map((row) => row.x))
    const right = Math.max(...rows.map((row) => row.x + row.width))
    const bottom = Math.max(...rows.map((row) => row.y + row.height))
    for (const one of drawing.nodes) {
      const part = build.partById.get(one.part)
      if (!part || (one.kind !== 'part' && one.kind !== 'stub')) continue
      if (one.kind === 'stub' || regionOf(part) === 'power')
        expect(one.x + one.width < left || one.y > bottom).toBe(true)
      else expect(one.x).toBeGreaterThan(right)
    }
  })

  it('leads passing runs clear of every tag', () => {
    const solid = drawing.nodes.filter((one) => one.kind === 'part' || one.kind === 'stub')
    for (const run of drawing.runs)
      for (let i = 0; i + 1 < (run.via?.length ?? 0); i += 2) {
        const [start, end] = [run.via![i]!, run.via![i + 1]!]
        const lane = { x: Math.min(start.x, end.x), y: start.y - 1, width: Math.abs(end.x - start.x), height: 2 }
        expect(start.y).toBe(end.y)
        expect(solid.filter((one) => overlaps(one, lane as DrawnNode)).map((one) => one.id)).toEqual([])
      }
  })
})

describe('the strip', () => {
  it('follows the numbering of the case, filled or empty', () => {
    const rows = arrange(tenDrives()).nodes.filter((node) => node.slot !== undefined)
    expect([...rows].sort((a, b) => a.y - b.y).map((row) => row.slot)).toEqual(
      Array.from({ length: 12 }, (_, i) => i + 1),
    )
    expect(rows.filter((row) => row.kind === 'empty-bay').map((row) => row.id)).toEqual(['case#11', 'case#12'])
  })

  it('frames the rows that a backplane serves', () => {
    const { nodes } = arrange(backplanes())
    const frame = nodes.find((node) => node.id === 'U2')!
    const served = nodes.filter((node) => node.slot !== undefined && contains(frame, node)).map((node) => node.slot)
    expect(served).toEqual([13, 14, 15, 16, 17, 18, 19, 20, 21, 22, 23, 24])
  })

  it('gives two drives in one bay a row each, so that neither is hidden', () => {
    const bay = { case: 'A', slot: 3 }
    const { nodes } = arrange(
      buildOf([
        { id: 'A', model: 'case-12' },
        { id: 'x', model: 'drive', bay },
        { id: 'y', model: 'drive', bay },
      ]),
    )
    expect(nodes.filter((node) => node.slot === 3).map((node) => node.id)).toEqual(['x', 'y'])
  })

  it('puts drives without a bay under the case', () => {
    const { nodes } = arrange(
      buildOf([
        { id: 'A', model: 'case-12' },
        { id: 'x', model: 'drive' },
      ]),
    )
    const frame = nodes.find((node) => node.id === 'A')!
    const loose = nodes.find((node) => node.id === 'x')!
    expect(loose.slot).toBeUndefined()
    expect(loose.y).toBeGreaterThan(frame.y + frame.height)
  })

  it('gives a backplane without a case rows of its own', () => {
    const { nodes } = arrange(
      buildOf(
        [
          { id: 'U', model: 'backplane-4' },
          { id: 'x', model: 'drive' },
        ],
        ['U.bay-2 x.plug'],
      ),
    )
    expect(nodes.filter((node) => node.slot !== undefined).map((node) => node.id)).toEqual(['U#1', 'x', 'U#3', 'U#4'])
  })
})

describe('power tails', () => {
  const drawing = arrange(tenDrives())

  it('stand at the height of the drive that they feed', () => {
    const height = (id: string) => {
      const node = drawing.nodes.find((one) => one.id === id)!
      return node.y + node.height / 2
    }
    expect(height('W8~tail-1')).toBe(height('C1'))
    expect(height('W9~tail-4')).toBe(height('C8'))
  })

  it('lead to the drive with a run that shows the power of the same joint', () => {
    const run = drawing.runs.find((one) => one.id === 'inner:W8:leg-2')!
    expect(run).toMatchObject({
      kind: 'inner',
      carries: 'power',
      from: { node: 'W8~tail-2', port: 'leg-2:power' },
      to: { node: 'C2', port: 'plug:power' },
    })
    expect(drawing.runs.find((one) => one.id === run.joint)).toMatchObject({ carries: 'data', kind: 'joint' })
  })
})

describe('a part that somebody moved', () => {
  const moved = { x: -1000, y: 40 }
  const build = tenDrives()
  const before = arrange(build)
  const part = build.document.parts.find(({ id }) => id === 'W6')!
  part.position = moved
  const after = arrange(build)

  it('stands where it was put', () => expect(after.nodes.find((node) => node.id === 'W6')).toMatchObject(moved))

  it('leaves everything else where it was, but for what lay under it', () => {
    const places = ({ nodes }: Drawing) =>
      nodes.filter((node) => node.id !== 'W6').map(({ id, x, y }) => ({ id, x, y }))
    const stayed = places(after).filter(
      (place, i) => place.x === places(before)[i]?.x && place.y === places(before)[i]?.y,
    )
    expect(places(after).length - stayed.length).toBeLessThanOrEqual(1)
    expect(clashes(after)).toEqual([])
  })
})

describe('a case that somebody moved', () => {
  const build = tenDrives()
  const before = arrange(build)
  build.document.parts.find(({ id }) => id === 'case')!.position = { x: 60, y: -400 }
  const after = arrange(build)
  const shift = (id: string) => {
    const [old, now] = [before, after].map(({ nodes }) => nodes.find((node) => node.id === id)!)
    return { x: now!.x - old!.x, y: now!.y - old!.y }
  }

  it('takes its bays along', () =>
    expect(['case', 'C1', 'C10', 'case#12'].map(shift)).toEqual(Array.from({ length: 4 }, () => ({ x: 60, y: -400 }))))

  it('leaves the looms where they are', () => {
    for (const id of ['T', 'W1', 'W5', 'W8', 'K1', 'K2', 'W8~tail-1'])
      expect([id, shift(id)]).toEqual([id, { x: 0, y: 0 }])
  })
})

describe('a drive without a bay that somebody moved', () => {
  it('stands where it was put and leaves the looms where they are', () => {
    const parts = [
      { id: 'T', model: 'supply' },
      { id: 'A', model: 'case-12' },
      { id: 'x', model: 'drive' },
    ]
    const before = arrange(buildOf(parts))
    const after = arrange(
      buildOf(parts.map((part) => (part.id === 'x' ? { ...part, position: { x: -900, y: 70 } } : part))),
    )
    const find = ({ nodes }: Drawing, id: string) => nodes.find((node) => node.id === id)!
    expect(find(after, 'x')).toMatchObject({ x: -900, y: 70 })
    expect(find(after, 'T').x).toBe(find(before, 'T').x)
  })
})

describe('any document', () => {
  it('is arranged without a clash, with every connector and joint, the same each time', () => {
    fc.assert(
      fc.property(wildBuild, (build) => {
        const drawing = arrange(build)
        expect(clashes(drawing)).toEqual([])
        expect([...drawnCounts(drawing)].sort()).toEqual([...connectorCounts(build)].sort())
        expect(drawing.runs.filter((run) => run.id === run.joint)).toHaveLength(build.joints.length)
        expect(new Set(drawing.runs.map((run) => run.id)).size).toBe(drawing.runs.length)
        expect(new Set(drawing.nodes.map((node) => node.id)).size).toBe(drawing.nodes.length)
        expect(arrange(build)).toEqual(drawing)
        for (const { x, y } of drawing.nodes) expect(Number.isFinite(x) && Number.isFinite(y)).toBe(true)
      }),
      { numRuns: 100 },
    )
  })

  it('may be empty', () =>
    expect(arrange(buildOf([]))).toEqual({ nodes: [], runs: [], bounds: { x: 0, y: 0, width: 0, height: 0 } }))

  it('may hold ten thousand parts', () => {
    const build = manyDrives(5160)
    expect(build.parts.length).toBeGreaterThan(9_900)
    expect(arrange(build).nodes.length).toBeGreaterThan(15_000)
  })

  it('may be one chain of splitters as long as the document allows', () => {
    const ids = Array.from({ length: 3000 }, (_, i) => `s${i}`)
    const joints = ids.slice(1).map((id, i) => `s${i}.out-1 ${id}.in`)
    expect(
      arrange(
        buildOf(
          ids.map((id) => ({ id, model: 'splitter-2' })),
          joints,
        ),
      ).nodes,
    ).toHaveLength(3000)
  })
})
