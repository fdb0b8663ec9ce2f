import type { Rail } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { states, type RailCurrents, type State } from './deviceCurrents.ts'
import type { Taken } from './figures.ts'
import { lineIndex } from './lines.ts'
import type { ConverterInput, PowerNetwork } from './network.ts'

/**
 * What converters take on their input for the devices behind them: for each device a draw of its own at the converter,
 * scaled by voltages and efficiency. The input is reckoned at its nominal voltage, so that loads stay constant currents.
 * Lower rails come first, so that a converter behind a converter is passed on.
 *
 * On the return the converter gives back what its devices return and takes what its own supply returns.
 */
export function convertedDraws({ byLine }: PowerNetwork, draws: readonly Draw[]): Draw[] {
  const made: Draw[] = []
  const scaled = new Map<ConverterInput, Map<RailCurrents, RailCurrents>>()
  for (const rail of ['3.3V', '5V'] as const) {
    const network = byLine[lineIndex[rail]]!
    if (!network.sources.some(({ takes }) => takes)) continue
    for (const draw of [...draws, ...made]) {
      if (!draw.flows || draw.rail !== rail) continue
      const sources = network.sourcesOf(draw.connector.index)
      for (const { takes } of sources) if (takes) made.push(atInput(draw, takes, draw.share / sources.length, scaled))
    }
  }
  return made
}

function atInput(
  { part, currents, courses }: Draw,
  takes: ConverterInput,
  share: number,
  scaled: Map<ConverterInput, Map<RailCurrents, RailCurrents>>,
): Draw {
  let known = scaled.get(takes)
  if (!known) scaled.set(takes, (known = new Map()))
  let taken = known.get(currents)
  if (!taken) known.set(currents, (taken = scale(currents, takes.rail, takes.ampere)))
  const { connector, rail, ampere } = takes
  const onReturn = 1 - 1 / ampere
  return { part, connector, rail, currents: taken, share, flows: true, lacksReturn: false, courses, onReturn }
}

function scale({ inState, start_s }: RailCurrents, rail: Rail, factor: number): RailCurrents {
  const one = (taken: Taken): Taken => ({
    ...taken,
    value: taken.value * factor,
    low: taken.low * factor,
    high: taken.high * factor,
  })
  const scaled = Object.fromEntries(states.map((state) => [state, one(inState[state])])) as Record<State, Taken>
  return { rail, inState: scaled, start_s }
}
