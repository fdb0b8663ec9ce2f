import { describe, expect, it } from 'vitest'
import { efficiencyAt, energy_kWhPerYear, ups_VA, wallLoad } from '#shared/electrical/wall.ts'
import { figure, model, powerDocument, steadyLoad, supply } from '../../helpers/powerCatalog.ts'
import { powerOf } from '../../helpers/powerOf.ts'

/** 80 PLUS Gold at 230 V: 90, 92, 89 % at 20, 50, 100 % of the rating [S56]. */
const gold = supply('gold', {
  total_W: 500,
  extra: {
    supply: {
      rails: [{ id: '12V', rail: '12V', setPoint_V: figure(12), limit_A: figure(50) }],
      total_W: figure(500),
      toleranceAt: 'socket',
      efficiency: [
        { share: 0.2, efficiency: figure(0.9) },
        { share: 0.5, efficiency: figure(0.92) },
        { share: 1, efficiency: figure(0.89) },
      ],
      powerFactor: figure(0.95),
    },
    connectors: [{ id: 's1', label: 's1', type: 'bare-receptacle', feeds: { '12V': '12V' } }],
  },
})
const drawing = (amperes: number) =>
  powerOf(
    powerDocument({ T1: 'gold', E1: 'load' }, ['T1.s1 E1.power'], {
      models: [gold, steadyLoad('load', { '12V': amperes })],
    }),
  ).power

describe('efficiency', () => {
  it('is read between the points of the curve, and held beyond them', () => {
    const curve = gold.supply!
    expect(efficiencyAt(curve, 0.2)).toBeCloseTo(0.9, 12)
    expect(efficiencyAt(curve, 0.35)).toBeCloseTo(0.91, 12)
    expect(efficiencyAt(curve, 0.75)).toBeCloseTo(0.905, 12)
    expect(efficiencyAt(curve, 0.05)).toBeCloseTo(0.9, 12)
    expect(efficiencyAt(curve, 1.2)).toBeCloseTo(0.89, 12)
    expect(efficiencyAt({ ...curve, efficiency: [] }, 0.5)).toBeNull()
  })
})

describe('at the wall', () => {
  it('turns watts into watts, volt-amperes and a year', () => {
    // 250 W is half the rating: 250 / 0.92 W, over 0.95 for volt-amperes, times 8760 h.
    const power = drawing(250 / 12)
    expect(wallLoad(power, 'at-rest')!.watts).toBeCloseTo(250 / 0.92, 9)
    expect(wallLoad(power, 'at-rest')!.voltAmperes).toBeCloseTo(250 / 0.92 / 0.95, 9)
    expect(energy_kWhPerYear(power)).toBeCloseTo((250 / 0.92) * 8.76, 6)
    expect(ups_VA(power)).toBeCloseTo(250 / 0.92 / 0.95, 9)
  })

  it.each([0, 7])('takes a power factor of %s for not stated: the worst stands, and nothing is endless', (factor) => {
    const odd = model('odd', { ...gold, supply: { ...gold.supply!, powerFactor: figure(factor) } })
    const { power } = powerOf(
      powerDocument({ T1: 'odd', E1: 'load' }, ['T1.s1 E1.power'], {
        models: [{ ...odd, id: 'odd' }, steadyLoad('load', { '12V': 250 / 12 })],
      }),
    )
    expect(ups_VA(power)).toBeCloseTo(250 / 0.92 / 0.9, 9)
  })

  it('says nothing where a loaded supply states no efficiency', () => {
    const bare = model('bare', { ...gold, supply: { ...gold.supply!, efficiency: [] } })
    const { power } = powerOf(
      powerDocument({ T1: 'bare', E1: 'load' }, ['T1.s1 E1.power'], {
        models: [{ ...bare, id: 'bare' }, steadyLoad('load', { '12V': 1 })],
      }),
    )
    expect(wallLoad(power, 'at-rest')).toBeNull()
    expect(energy_kWhPerYear(power)).toBeNull()
    expect(ups_VA(power)).toBeNull()
  })

  it('says nothing without a supply', () => {
    const { power } = powerOf(powerDocument({}))
    expect(energy_kWhPerYear(power)).toBeNull()
    expect(ups_VA(power)).toBeNull()
  })
})
