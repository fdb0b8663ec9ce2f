import { describe, expect, it } from 'vitest'
import type { BuildDocument } from '#shared/build/document.ts'
import { contactOverRating } from '#shared/rules/contact-over-rating/index.ts'
import { unpowered } from '#shared/rules/unpowered/index.ts'
import { unproven } from '#shared/rules/unproven/index.ts'
import { voltageOutOfTolerance } from '#shared/rules/voltage-out-of-tolerance/index.ts'
import { wireOverAmpacity } from '#shared/rules/wire-over-ampacity/index.ts'
import { findingsOf } from '../../helpers/findingsOf.ts'
import {
  chain,
  connector,
  figure,
  model,
  planes,
  powerCatalog,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'

const remedies = (rule: typeof contactOverRating, document: BuildDocument): string[] =>
  findingsOf(rule, document, powerCatalog).map(({ remedy }) => remedy)

describe('what to do about a hop that carries too much', () => {
  it('a header of a board: feed the fan from a lead, not a thicker board', () => {
    const board = model('board', {
      kind: 'board',
      connectors: [connector('main', 'bare-plug'), connector('fan-1', 'bare-receptacle')],
      wiring: planes([['main', 'fan-1', 1]], ['12V', 'return']).map((wire) => ({ ...wire, ampacity_A: figure(1) })),
    })
    const found = remedies(
      wireOverAmpacity,
      powerDocument({ T1: 'supply', K1: 'board', G1: 'fan' }, ['T1.s1 K1.main', 'K1.fan-1 G1.power'], {
        models: [board, { ...steadyLoad('fan', { '12V': 4 }), kind: 'fan' }],
      }),
    )
    expect(found).toEqual(['Feed G1 from a lead of the supply instead of K1, through a fitting adapter.'])
  })

  const backplane = model('plane', {
    kind: 'backplane',
    connectors: [
      connector('power-1', 'sata-power-plug'),
      connector('power-2', 'sata-power-plug'),
      ...[1, 2, 3].map((bay) => connector(`bay-${bay}`, 'sata-power-receptacle', { bay })),
    ],
    wiring: planes([
      ['power-1', 'power-2', 0.1],
      ['power-1', 'bay-1', 0.1],
      ['power-1', 'bay-2', 0.1],
      ['power-2', 'bay-3', 0.1],
    ]),
  })
  const inBays = (joints: readonly string[]) =>
    powerDocument(
      { T1: 'supply', W1: 'lead', W2: 'lead', U1: 'plane', C1: 'drive', C2: 'drive', C3: 'drive' },
      ['T1.s1 W1.supply', 'W1.out-1 U1.power-1', ...[1, 2, 3].map((i) => `U1.bay-${i} C${i}.plug`), ...joints],
      { models: [backplane] },
    )

  it('one inlet of a backplane for all bays: join the open one', () => {
    const [remedy] = remedies(contactOverRating, inBays([]))
    expect(remedy).toBe(
      'Join U1 power-2 to leads of their own, so that more inlets share the current, or start the drives in groups.',
    )
  })

  it('all inlets of a backplane joined: drives in its bays cannot be fed another way', () => {
    const all = { ...inBays(['T1.s2 W2.supply', 'W2.out-1 U1.power-2']) }
    const found = remedies(contactOverRating, { ...all, settings: { ...all.settings, derating: 0.3 } })
    expect(found.length).toBeGreaterThan(0)
    for (const remedy of found) expect(remedy).not.toMatch(/another way than through U1/)
  })

  it('a captive lead is not replaced, devices move to another one', () => {
    const captive = supply('captive', {
      extra: {
        connectors: [connector('l1-1', 'bare-receptacle', { feeds: { '12V': '12V', '5V': '5V', '3.3V': '3.3V' } })],
        wiring: chain(['inside', 'l1-1'], { awg: 22, lines: ['12V', 'return'] }),
      },
    })
    const found = remedies(
      wireOverAmpacity,
      powerDocument(
        { T1: 'captive', W1: 'lead', C1: 'drive', C2: 'drive', C3: 'drive' },
        ['T1.l1-1 W1.supply', ...[1, 2, 3].map((i) => `W1.out-${i} C${i}.plug`)],
        { models: [captive] },
      ),
    )
    expect(found).toContain('Move some of these devices to another lead of T1.')
  })
})

describe('leads in a ring', () => {
  it('are named once, whoever hangs on them', () => {
    const ring = powerDocument({ W1: 'splitter-2', W2: 'splitter-2', C1: 'drive' }, [
      'W1.out-1 W2.in',
      'W2.out-1 W1.in',
      'W2.out-2 C1.plug',
    ])
    const messages = findingsOf(unpowered, ring, powerCatalog).map(({ message }) => message)
    expect(messages).toContain('W1 and W2 feed each other in a ring, and nothing of a supply comes in.')
    expect(messages).toHaveLength(2)
  })

  it('are not seen in a chain', () => {
    const row = powerDocument({ W1: 'splitter-2', W2: 'splitter-2' }, ['W1.out-1 W2.in'])
    expect(findingsOf(unpowered, row, powerCatalog)).toEqual([])
  })
})

describe('a length that nobody knows', () => {
  const unsure = model('unsure', {
    kind: 'lead',
    connectors: [connector('supply', 'bare-plug'), connector('out-1', 'bare-receptacle')],
    wiring: chain(['supply', 'out-1']).map((wire) => ({
      ...wire,
      length_mm: { value: null, low: 100, high: 4000, origin: 'guess' as const },
    })),
  })
  const built = powerDocument({ T1: 'supply', W1: 'unsure', E1: 'own' }, ['T1.s1 W1.supply', 'W1.out-1 E1.power'], {
    models: [unsure, steadyLoad('own', { '12V': 8 })],
  })

  it('is taken at its long end, and the verdict says that it rests on it', () => {
    const [found] = findingsOf(voltageOutOfTolerance, built, powerCatalog)
    expect(found).toMatchObject({ severity: 'fault', about: true })
    expect(found!.decidedBy.map(({ what }) => what)).toContain('length of W1')
  })

  it('is named as what would settle the verdict', () => {
    const notes = findingsOf(unproven, built, powerCatalog).filter(({ message }) => message.includes('length of W1'))
    expect(notes).toHaveLength(1)
    expect(notes[0]!.message).toContain('At its near end 1 verdict would turn good: E1 on 12 V.')
    expect(notes[0]!.remedy).toBe('Measure the lead and state its length on the part.')
  })

  it('settles nothing where even the short end is too long', () => {
    const far = {
      ...unsure,
      wiring: unsure.wiring.map((wire) => ({ ...wire, length_mm: { ...wire.length_mm!, low: 3900 } })),
    }
    const still = { ...built, models: [far, built.models[1]!] }
    const notes = findingsOf(unproven, still, powerCatalog).filter(({ message }) => message.includes('length of W1'))
    expect(notes).toEqual([])
  })
})
