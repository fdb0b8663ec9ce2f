import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { solveWithNgspice } from '../../../helpers/ngspice.ts'
import { connectedNetwork, solvePlain } from '../../../helpers/randomNetworks.ts'

/** Share of the source voltage by which two solvers may differ. */
const agreement = 1e-9

/** ngspice 39 (Debian) as an independent solver: many random networks in one run. */
describe('beside ngspice', () => {
  it.each([
    ['radial', { maxNodes: 60, maxChords: 0 }],
    ['meshed', { maxNodes: 60, maxChords: 12 }],
    ['meshed with several sources', { maxNodes: 40, maxChords: 12, maxHeld: 3 }],
  ])('agrees on %s networks to 1e-9 of the source', (_, shape) => {
    const networks = fc.sample(connectedNetwork(shape), 60)
    const reference = solveWithNgspice(networks)
    networks.forEach((network, n) => {
      const { solution } = solvePlain(network)
      for (let node = 0; node < network.nodes; node++)
        expect(Math.abs(solution.voltage_V[node]! - reference.voltage_V[n]![node]!)).toBeLessThan(12 * agreement)
    })
  })
})
