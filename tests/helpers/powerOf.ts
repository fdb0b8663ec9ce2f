import type { BuildDocument } from '#shared/build/document.ts'
import { resolve } from '#shared/build/resolve.ts'
import { momentIds, type MomentId } from '#shared/check/result.ts'
import { analyseData } from '#shared/datapath/analyse.ts'
import { analysePower } from '#shared/electrical/analyse.ts'
import type { ConductorLoad, ContactLoad, DeviceLoad, PowerResult } from '#shared/electrical/result.ts'
import type { Line, Rail } from '#shared/quantity/rails.ts'
import { powerCatalog } from './powerCatalog.ts'

const found = <T>(value: T | undefined, what: string): T => {
  if (value === undefined) throw new Error(`no ${what}`)
  return value
}

/** The power side of a document, with short ways to single numbers. */
export function powerOf(document: BuildDocument, catalog = powerCatalog) {
  const build = resolve(document, catalog)
  if (build.problems.length > 0) throw new Error(JSON.stringify(build.problems))
  const power = analysePower(build, analyseData(build))
  const at = (moment: MomentId) => momentIds.indexOf(moment)
  const contact = (joint: number, line: Line): ContactLoad =>
    found(
      power.contacts.find((load) => load.joint.joint.id === `j${joint}` && load.line === line),
      `contact j${joint} ${line}`,
    )
  const device = (ref: string, rail: Rail): DeviceLoad =>
    found(
      power.devices.find((load) => load.part.part.ref === ref && load.rail === rail),
      `device ${ref} ${rail}`,
    )
  const conductor = (ref: string, from: string, to: string, line: Line): ConductorLoad =>
    found(
      power.conductors.find(
        (load) =>
          load.part.part.ref === ref &&
          load.conductor.from === from &&
          load.conductor.to === to &&
          load.conductor.line === line,
      ),
      `conductor ${ref} ${from} ${to} ${line}`,
    )
  return {
    build,
    power,
    contact,
    device,
    conductor,
    current: (joint: number, line: Line, moment: MomentId): number => contact(joint, line).current_A[at(moment)]!,
    voltage: (ref: string, rail: Rail, moment: MomentId): number => device(ref, rail).voltage_V[at(moment)]!,
    drop: (ref: string, rail: Rail, moment: MomentId) => {
      const { wire, contact: contacts, return: back } = device(ref, rail).drop_V
      return { wire: wire[at(moment)]!, contact: contacts[at(moment)]!, return: back[at(moment)]! }
    },
    rail: (rail: string, moment: MomentId): number =>
      found(
        power.rails.find((load) => load.rail.id === rail),
        `rail ${rail}`,
      ).current_A[at(moment)]!,
  }
}

/** Every current and voltage of a result, for checks that nothing is out of hand. */
export function allNumbers(power: PowerResult): number[] {
  return [
    ...power.contacts.flatMap(({ current_A, range_A }) => [...current_A, ...range_A.low, ...range_A.high]),
    ...power.conductors.flatMap(({ current_A, range_A }) => [...current_A, ...range_A.low, ...range_A.high]),
    ...power.rails.flatMap(({ current_A }) => [...current_A]),
    ...power.totals.flatMap(({ load_W }) => [...load_W]),
    ...power.devices.flatMap(({ current_A, voltage_V, aged_V, atHigh_V, drop_V }) => [
      ...current_A,
      ...voltage_V,
      ...aged_V,
      ...atHigh_V,
      ...drop_V.wire,
      ...drop_V.contact,
      ...drop_V.return,
    ]),
    ...power.timeline.flatMap(({ rails_A }) => [...rails_A]),
  ]
}
