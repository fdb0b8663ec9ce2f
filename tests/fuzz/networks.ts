import fc from 'fast-check'
import { solveWithNgspice } from '../helpers/ngspice.ts'
import { connectedNetwork, solvePlain, wildNetwork } from '../helpers/randomNetworks.ts'

/** Share of the source voltage by which two solvers may differ. */
const agreement = 1e-9
const source_V = 12
/** Networks that go to ngspice in one run: starting it costs more than solving them. */
const batch = 40

const shapes = fc.oneof(
  connectedNetwork({ maxNodes: 80, maxChords: 0 }),
  connectedNetwork({ maxNodes: 60, maxChords: 15 }),
  connectedNetwork({ maxNodes: 40, maxChords: 15, maxHeld: 3 }),
)

/** Random networks, radial and meshed, agree with ngspice at every node. */
export const networksAgree = () =>
  fc.property(fc.array(shapes, { minLength: batch, maxLength: batch, size: 'max' }), (networks) => {
    const { voltage_V } = solveWithNgspice(networks)
    networks.forEach((network, n) => {
      const { solution } = solvePlain(network)
      for (let node = 0; node < network.nodes; node++) {
        const off = Math.abs(solution.voltage_V[node]! - voltage_V[n]![node]!)
        if (!(off <= source_V * agreement))
          throw new Error(`node ${node} is off by ${off} V: ${JSON.stringify(network)}`)
      }
    })
  })

/** Any network, floating, shorted or without a source, is solved to numbers that keep Kirchhoff at every free node. */
export const networksStaySound = () =>
  fc.property(wildNetwork, (network) => {
    const { plan, solution, drawn_A } = solvePlain(network)
    const left = drawn_A.map((ampere) => -ampere)
    solution.current_A.forEach((ampere, branch) => {
      left[plan.to[branch]!]! += ampere
      left[plan.from[branch]!]! -= ampere
    })
    const worst = left.reduce(
      (most, ampere, node) => (plan.held[node] === 0 ? Math.max(most, Math.abs(ampere)) : most),
      0,
    )
    if (!(worst < 1e-6) || !solution.voltage_V.every(Number.isFinite))
      throw new Error(`off by ${worst} A: ${JSON.stringify(network)}`)
  })
