import { describe, expect, it } from 'vitest'
import { analyseData } from '#shared/datapath/analyse.ts'
import { buildOf, merged, times } from '../../helpers/fixtures/build.ts'

const analyse = (...input: Parameters<typeof buildOf>) => {
  const build = buildOf(...input)
  const data = analyseData(build)
  const paths = data.paths.map(
    (path) =>
      `${path.controller.part.part.ref}.${path.port.connector.id}/${path.lane} > ${path.drive.part.ref}/${path.drivePort}` +
      (path.fault ? ` (${path.fault.kind})` : ''),
  )
  return { build, data, paths }
}

const drives = (count: number, model: string) => merged(times(count, (i) => [`C${i}`, model] as const))
const legs = (cable: string, count: number, from = 1) => times(count, (i) => `${cable}.leg-${i} C${from + i - 1}.plug`)

describe('lanes', () => {
  it('four drives on one four-lane connector, lane by lane (common practice)', () => {
    const { paths, data } = analyse({ K1: 'hba-8i', W1: 'breakout-sas', ...drives(4, 'sas-4tb') }, [
      'K1.port-a W1.host',
      ...legs('W1', 4),
    ])
    expect(paths).toEqual(times(4, (i) => `K1.port-a/${i - 1} > C${i}/0`))
    expect(data.paths.map((path) => path.rate_Gbps)).toEqual([6, 6, 6, 6])
    expect(data.paths[0]?.through.map((part) => part.part.ref)).toEqual(['W1'])
  })

  it('a controller with two four-lane connectors takes eight drives (common practice)', () => {
    const { paths } = analyse({ K1: 'hba-8i', W1: 'breakout-sas', W2: 'breakout-sas', ...drives(8, 'sas-4tb') }, [
      'K1.port-a W1.host',
      'K1.port-b W2.host',
      ...legs('W1', 4),
      ...legs('W2', 4, 5),
    ])
    expect(paths).toHaveLength(8)
    expect(paths[7]).toBe('K1.port-b/3 > C8/0')
  })

  it('goes through a straight cable and a backplane, whichever way round joints are drawn', () => {
    const { paths, data } = analyse({ K1: 'hba-4i', W1: 'cable-8087', U1: 'backplane', C1: 'sas-4tb' }, [
      'W1.b K1.port-a',
      'U1.data-1 W1.a',
      'C1.plug U1.bay-3',
    ])
    expect(paths).toEqual(['K1.port-a/2 > C1/0'])
    expect(data.paths[0]?.joints.map((joint) => joint.joint.id)).toEqual(['j1', 'j2', 'j3'])
  })

  it('reaches the second port of a SAS drive only where its lane is wired, and never one the drive lacks', () => {
    const parts = { K1: 'hba-4i', W1: 'cable-8087', U1: 'backplane-dual' }
    const joints = ['K1.port-a W1.a', 'W1.b U1.data-1', 'U1.bay-1 C1.plug']
    const twoPorts = analyse({ ...parts, C1: 'sas-4tb' }, joints)
    expect(twoPorts.paths).toEqual(['K1.port-a/0 > C1/0', 'K1.port-a/1 > C1/1'])
    expect(analyse({ ...parts, C1: 'sas-4tb-single' }, joints).paths).toEqual(['K1.port-a/0 > C1/0'])
    expect(analyse({ ...parts, C1: 'sata-4tb' }, joints).paths).toEqual(['K1.port-a/0 > C1/0'])
  })

  it('takes the four lanes of an NVMe drive as one link', () => {
    const { paths, data } = analyse({ K1: 'nvme-host', C1: 'u2' }, ['K1.port-a C1.plug'])
    expect(paths).toEqual(['K1.port-a/0 > C1/0'])
    expect(data.paths[0]).toMatchObject({ rate_Gbps: 8, fault: null })
  })

  it('does not hang where expanders form a ring, and says so', () => {
    const { paths, data } = analyse(
      {
        K1: 'hba-8i',
        K2: 'expander-6',
        K3: 'expander-6',
        W1: 'cable-8087',
        W2: 'cable-8087',
        W3: 'cable-8087',
        C1: 'sas-4tb',
        W4: 'breakout-sas',
      },
      [
        'K1.port-a W1.a',
        'W1.b K2.port-1',
        'K1.port-b W2.a',
        'W2.b K3.port-1',
        'K2.port-2 W3.a',
        'W3.b K3.port-2',
        'K3.port-3 W4.host',
        'W4.leg-1 C1.plug',
      ],
    )
    expect(paths).toEqual(['K1.port-b/0 > C1/0'])
    expect(data.loops.map((loop) => loop.expander.part.ref)).toContain('K3')
  })

  it('counts two cables to one expander as one wide port, not as a ring', () => {
    const { data, paths } = analyse(
      { K1: 'hba-8i', K2: 'expander-6', W1: 'cable-8087', W2: 'cable-8087', W3: 'breakout-sas', C1: 'sas-4tb' },
      ['K1.port-a W1.a', 'W1.b K2.port-1', 'K1.port-b W2.a', 'W2.b K2.port-2', 'K2.port-3 W3.host', 'W3.leg-1 C1.plug'],
    )
    expect(paths).toEqual(['K1.port-a/0 > C1/0'])
    expect(data.loops).toEqual([])
    expect(data.shared.find((link) => link.kind === 'uplink')).toMatchObject({ lanes: 8, capacity_MBps: 4800 })
  })

  it('follows a cascade of expanders', () => {
    const { data } = analyse(
      {
        K1: 'hba-4i',
        K2: 'expander-6',
        K3: 'expander-6',
        W1: 'cable-8087',
        W2: 'cable-8087-3g',
        W3: 'breakout-sas',
        C1: 'sas-4tb',
      },
      ['K1.port-a W1.a', 'W1.b K2.port-1', 'K2.port-2 W2.a', 'W2.b K3.port-1', 'K3.port-2 W3.host', 'W3.leg-1 C1.plug'],
    )
    const [path] = data.paths
    expect(path?.expanders.map((part) => part.part.ref)).toEqual(['K2', 'K3'])
    expect(path).toMatchObject({ rate_Gbps: 3, limitedBy: { part: { ref: 'W2' } } })
  })
})

describe('direction', () => {
  const board = { K1: 'board', C1: 'sata-4tb', U1: 'backplane' }

  it('a forward breakout at the controller and a reverse one at host ports are right', () => {
    expect(
      analyse({ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']).paths,
    ).toEqual(['K1.port-a/0 > C1/0'])
    const reverse = analyse({ ...board, W1: 'breakout-reverse' }, [
      'K1.sata-1 W1.leg-1',
      'W1.device U1.data-1',
      'U1.bay-1 C1.plug',
    ])
    expect(reverse.paths).toEqual(['K1.sata-1/0 > C1/0'])
    expect(reverse.data.reversals).toEqual([])
  })

  it('each in the place of the other stays dark', () => {
    expect(
      analyse({ K1: 'hba-4i', W1: 'breakout-reverse', C1: 'sata-4tb' }, ['K1.port-a W1.device', 'W1.leg-1 C1.plug'])
        .paths,
    ).toEqual(['K1.port-a/0 > C1/0 (reversed)'])
    expect(
      analyse({ ...board, W1: 'breakout-sata' }, ['K1.sata-1 W1.leg-1', 'W1.host U1.data-1', 'U1.bay-1 C1.plug']).paths,
    ).toEqual(['K1.sata-1/0 > C1/0 (reversed)'])
  })
})

describe('protocol', () => {
  it('a SATA drive works behind a SAS controller and a SAS expander', () => {
    const { paths } = analyse(
      { K1: 'hba-4i', K2: 'expander-6', W1: 'cable-8087', W2: 'breakout-sata', C1: 'sata-4tb' },
      ['K1.port-a W1.a', 'W1.b K2.port-1', 'K2.port-2 W2.host', 'W2.leg-1 C1.plug'],
    )
    expect(paths).toEqual(['K1.port-a/0 > C1/0'])
  })

  it('a SAS drive behind a SATA controller does not', () => {
    const { paths, data } = analyse({ K1: 'sata-8i', W1: 'breakout-sas', C1: 'sas-4tb' }, [
      'K1.port-a W1.host',
      'W1.leg-1 C1.plug',
    ])
    expect(paths).toEqual(['K1.port-a/0 > C1/0 (protocol)'])
    expect(data.paths[0]?.fault).toMatchObject({ part: { part: { ref: 'K1' } }, needs: 'sas' })
  })

  it('an expander behind SATA ports does not, not even with SATA drives', () => {
    const { data } = analyse(
      { K1: 'sata-8i', K2: 'expander-6', W1: 'cable-8087', W2: 'breakout-sata', C1: 'sata-4tb' },
      ['K1.port-a W1.a', 'W1.b K2.port-1', 'K2.port-2 W2.host', 'W2.leg-1 C1.plug'],
    )
    expect(data.paths[0]?.fault).toMatchObject({ kind: 'protocol', part: { part: { ref: 'K1' } }, needs: 'sas' })
  })
})

describe('shared links and scan', () => {
  const behindExpander = (count: number, drive: string, hba = 'hba-8i', cable = 'cable-8087') => {
    const cables = Math.ceil(count / 4)
    return analyse(
      {
        K1: hba,
        K9: 'board',
        K2: 'expander-6',
        W99: cable,
        ...merged(times(cables, (i) => [`W${i}`, 'breakout-sas'] as const)),
        ...drives(count, drive),
      },
      [
        'K1.edge K9.slot-1',
        'K1.port-a W99.a',
        'W99.b K2.port-1',
        ...times(cables, (i) => `K2.port-${i + 1} W${i}.host`),
        ...times(count, (i) => `W${Math.ceil(i / 4)}.leg-${((i - 1) % 4) + 1} C${i}.plug`),
      ],
    )
  }

  it('20 drives behind an x4 link at 3 Gb/s get 60 MB/s each and take as long as that says', () => {
    const { data, build } = behindExpander(20, 'sas-4tb', 'hba-8i', 'cable-8087-3g')
    expect(data.share_MBps.get(build.partById.get('C7')!.index)).toBeCloseTo(1200 / 20, 9)
    // 60 MB/s is below the inner track of 90: the whole drive is read at 60.
    expect(data.scan.hours).toBeCloseTo(4e6 / 60 / 3600, 9)
    expect(data.scan.drivesAlone_hours).toBeCloseTo(4e6 / 135 / 3600, 9)
    expect(data.scan.bottleneck).toMatchObject({
      kind: 'shared',
      link: { kind: 'uplink', lanes: 4, capacity_MBps: 1200 },
    })
  })

  it('four drives behind the same link are not slowed', () => {
    const { data } = behindExpander(4, 'sas-4tb')
    expect(data.scan).toMatchObject({ bottleneck: null, about: false })
    expect(data.scan.hours).toBeCloseTo(data.scan.drivesAlone_hours!, 9)
  })

  it('a card runs at the lanes and generation that both it and its slot have', () => {
    const slotOf = (board: string, card: string) =>
      analyse({ K1: card, K2: board }, ['K1.edge K2.slot-1']).data.shared.find(
        (link) => link.kind === 'slot' && link.part.part.ref === 'K1',
      )
    expect(slotOf('board', 'hba-8i')).toMatchObject({ lanes: 8, generation: 3 })
    expect(slotOf('board-narrow', 'hba-8i')).toMatchObject({ lanes: 4, generation: 2, capacity_MBps: 2000 })
    expect(slotOf('board', 'hba-8i-gen2')).toMatchObject({ lanes: 8, generation: 2, capacity_MBps: 4000 })
  })

  it('leaves cache, boot and spare drives out of the scan', () => {
    const parts = { K1: 'hba-4i', W1: 'breakout-sas', C1: { model: 'sas-4tb', role: 'data' as const } }
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'W1.leg-2 C2.plug']
    const without = analyse({ ...parts, C2: { model: 'sas-8tb', role: 'cache' } }, joints).data.scan
    const together = analyse({ ...parts, C2: { model: 'sas-8tb', role: 'data' } }, joints).data.scan
    expect(without.hours).toBeCloseTo(4e6 / 135 / 3600, 9)
    expect(together.hours!).toBeGreaterThan(without.hours! * 1.5)
  })

  it('has no time without drives, and an uncertain one where a rate is unknown', () => {
    expect(analyse({ K1: 'hba-4i' }).data.scan).toEqual({
      hours: null,
      drivesAlone_hours: null,
      bottleneck: null,
      about: false,
    })
    const unknown = { outerRate_MBps: { value: null, origin: 'guess' as const } }
    const build = {
      K1: 'hba-4i',
      W1: 'breakout-sas',
      C1: { model: 'sas-4tb', overrides: { 'drive.outerRate_MBps': unknown.outerRate_MBps } },
    }
    expect(analyse(build, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']).data.scan).toMatchObject({
      drivesAlone_hours: null,
      about: true,
    })
  })
})
