import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** A direct-current network as plain lists: held nodes have a voltage, others may draw a current. */
export interface PlainNetwork {
  nodes: number
  branches: readonly { from: number; to: number; ohm: number }[]
  /** Voltage of held nodes, by node. */
  held: ReadonlyMap<number, number>
  draw_A: readonly number[]
}

export interface NgspiceAnswer {
  /** Voltage of each node, by network. */
  voltage_V: number[][]
  /** What ngspice says its own analyses took, all times together. */
  analysis_s: number
}

/** True where the independent solver is installed (Debian package `ngspice`). */
export const hasNgspice = (): boolean => spawnSync('ngspice', ['--version']).status === 0

/** Solves many networks in one run of ngspice, each with node names of its own; `times` over, where time is taken. */
export function solveWithNgspice(networks: readonly PlainNetwork[], times = 1): NgspiceAnswer {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-ngspice-'))
  try {
    const file = join(folder, 'networks.cir')
    writeFileSync(file, netlist(networks, times))
    const run = spawnSync('ngspice', ['-b', file], { encoding: 'utf8', maxBuffer: 1 << 30, cwd: folder })
    return readAnswer(run.stdout, networks)
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

const name = (network: number, node: number): string => `n${network}x${node}`

function netlist(networks: readonly PlainNetwork[], times: number): string {
  const lines = ['* networks']
  networks.forEach(({ branches, held, draw_A }, n) => {
    for (const [node, volts] of held) lines.push(`V${n}x${node} ${name(n, node)} 0 DC ${volts}`)
    branches.forEach(({ from, to, ohm }, i) => lines.push(`R${n}x${i} ${name(n, from)} ${name(n, to)} ${ohm}`))
    draw_A.forEach((ampere, node) => {
      if (ampere !== 0) lines.push(`I${n}x${node} ${name(n, node)} 0 DC ${ampere}`)
    })
  })
  return [
    ...lines,
    '.control',
    'set numdgt=16',
    ...Array<string>(times).fill('op'),
    'print all',
    'rusage time',
    '.endc',
    '.end',
    '',
  ].join('\n')
}

function readAnswer(output: string, networks: readonly PlainNetwork[]): NgspiceAnswer {
  const voltage_V = networks.map(({ nodes }) => new Array<number>(nodes).fill(NaN))
  for (const [, network, node, volts] of output.matchAll(/^n(\d+)x(\d+) = (\S+)$/gm))
    voltage_V[Number(network)]![Number(node)] = Number(volts)
  const analysis_s = Number(/Total analysis time \(seconds\) = (\S+)/.exec(output)?.[1] ?? NaN)
  return { voltage_V, analysis_s }
}
