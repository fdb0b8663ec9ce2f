import { buildOf } from './smallCatalog.ts'

type Parts = Parameters<typeof buildOf>[0]

const range = (count: number): number[] => Array.from({ length: count }, (_, i) => i + 1)

/** Ten drives, two breakouts with power tails, splitters, board ports for the rest: the commonest real machine. */
export function tenDrives() {
  const parts: Parts = [
    { id: 'case', model: 'case-12' },
    { id: 'T', model: 'supply' },
    ...range(10).map((i) => ({
      id: `C${i}`,
      model: 'drive',
      bay: { case: 'case', slot: i },
      serial: `K4H10000${(7000 + i * 37).toString(16).toUpperCase()}`,
      role: i === 10 ? ('parity' as const) : ('data' as const),
    })),
    { id: 'W1', model: 'lead-3' },
    { id: 'W2', model: 'lead-3' },
    { id: 'W3', model: 'lead-3' },
    { id: 'W5', model: 'splitter-2' },
    { id: 'W6', model: 'splitter-4' },
    { id: 'W7', model: 'splitter-2' },
    { id: 'W8', model: 'breakout-tails' },
    { id: 'W9', model: 'breakout-tails' },
    { id: 'W10', model: 'cable-data' },
    { id: 'K1', model: 'controller' },
    { id: 'K2', model: 'board' },
    { id: 'G1', model: 'fan' },
  ]
  const joints = [
    'T.drive-1 W1.supply',
    'T.drive-2 W2.supply',
    'T.drive-3 W3.supply',
    'W2.out-1 W5.in',
    'W2.out-2 W6.in',
    'W3.out-1 W7.in',
    'K1.port-a W8.host',
    'K1.port-b W9.host',
    'K1.edge K2.slot-1',
    ...range(4).map((i) => `W8.leg-${i} C${i}.plug`),
    ...range(4).map((i) => `W9.leg-${i} C${i + 4}.plug`),
    ...range(3).map((i) => `W1.out-${i} W8.tail-${i}`),
    'W5.out-1 W8.tail-4',
    'W5.out-2 W9.tail-1',
    'W6.out-1 W9.tail-2',
    'W6.out-2 W9.tail-3',
    'W6.out-3 W9.tail-4',
    'W7.out-1 C9.plug',
    'W7.out-2 C10.plug',
    'W10.a C9.plug',
    'W10.b K2.sata-1',
    'K2.fan-1 G1.power',
  ]
  return buildOf(parts, joints)
}

/** Twenty-four bays behind two backplanes of twelve, fed by leads, through an expander. */
export function backplanes() {
  const parts: Parts = [
    { id: 'case', model: 'case-24' },
    { id: 'T', model: 'supply' },
    { id: 'U1', model: 'backplane-12', bay: { case: 'case', slot: 1 } },
    { id: 'U2', model: 'backplane-12', bay: { case: 'case', slot: 13 } },
    ...range(20).map((i) => ({ id: `C${i}`, model: 'drive', bay: { case: 'case', slot: i } })),
    ...range(2).map((i) => ({ id: `W${i}`, model: 'lead-4' })),
    ...range(7).map((i) => ({ id: `W${10 + i}`, model: 'cable-multi' })),
    { id: 'K1', model: 'controller' },
    { id: 'K2', model: 'expander' },
    { id: 'K3', model: 'board' },
  ]
  const joints = [
    'T.drive-1 W1.supply',
    'T.drive-2 W2.supply',
    'W1.out-1 U1.power-1',
    'W1.out-2 U1.power-2',
    'W2.out-1 U2.power-1',
    'W2.out-2 U2.power-2',
    'W2.out-3 K2.power',
    ...range(20).map((i) => `U${i <= 12 ? 1 : 2}.bay-${i <= 12 ? i : i - 12} C${i}.plug`),
    ...range(6).map((i) => `U${i <= 3 ? 1 : 2}.data-${i <= 3 ? i : i - 3} W${10 + i}.a`),
    ...range(5).map((i) => `W${10 + i}.b K2.port-${i}`),
    'W16.b K1.port-b',
    'W17.a K2.port-6',
    'W17.b K1.port-a',
    'K1.edge K3.slot-2',
  ]
  return buildOf(parts, joints)
}

/** `count` drives with leads of four, breakouts and controllers: the shape of a large machine, in any size. */
export function manyDrives(count: number) {
  const cases = Math.ceil(count / 60)
  const parts: Parts = range(cases).map((i) => ({ id: `A${i}`, model: 'case-60' }))
  const joints: string[] = []
  for (const i of range(count)) {
    const slot = ((i - 1) % 60) + 1
    parts.push({ id: `C${i}`, model: 'drive', bay: { case: `A${Math.ceil(i / 60)}`, slot } })
    const group = Math.ceil(i / 4)
    const leg = ((i - 1) % 4) + 1
    if (leg === 1) {
      parts.push({ id: `L${group}`, model: 'lead-3' }, { id: `S${group}`, model: 'splitter-2' })
      parts.push({ id: `B${group}`, model: 'breakout-tails' })
      joints.push(`L${group}.out-1 S${group}.in`)
      if (group % 6 === 1) parts.push({ id: `T${Math.ceil(group / 6)}`, model: 'supply' })
      joints.push(`T${Math.ceil(group / 6)}.drive-${((group - 1) % 6) + 1} L${group}.supply`)
      if (group % 2 === 1) parts.push({ id: `K${Math.ceil(group / 2)}`, model: 'controller' })
      joints.push(`K${Math.ceil(group / 2)}.port-${group % 2 === 1 ? 'a' : 'b'} B${group}.host`)
    }
    joints.push(`B${group}.leg-${leg} C${i}.plug`)
    joints.push(
      leg <= 2 ? `S${group}.out-${leg} B${group}.tail-${leg}` : `L${group}.out-${leg - 1} B${group}.tail-${leg}`,
    )
  }
  return buildOf(parts, joints)
}
