import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import type { RailLoad } from '../catalog/model.ts'
import type { Quantity } from '../quantity/quantity.ts'
import { rails, type Rail } from '../quantity/rails.ts'
import { lineName } from './lines.ts'
import { takeLoad, type Taken } from './figures.ts'

/** What a device is doing. `waiting` is powered and not yet started, or asleep. */
export const states = ['starting', 'resting', 'scanning', 'writing', 'waiting'] as const
export type State = (typeof states)[number]

/** What one device takes from one rail in each state. */
export interface RailCurrents {
  rail: Rail
  inState: Readonly<Record<State, Taken>>
  /** Seconds that the start lasts; zero where nothing starts on this rail. */
  start_s: number
}

/**
 * Worst currents of one device where neither it nor its class states any, amperes. Guesses on the high side: an old
 * fast-starting 3.5 in drive on 12 V and 5 V, a 25 W solid-state drive, a slot at its limit on 3.3 V.
 */
const worst_A: Readonly<Record<Rail, Readonly<Record<State, number>>>> = {
  '12V': { starting: 3, resting: 1, scanning: 1.5, writing: 2.1, waiting: 1 },
  '5V': { starting: 1.5, resting: 1, scanning: 1.2, writing: 2, waiting: 1 },
  '3.3V': { starting: 3, resting: 1, scanning: 2, writing: 3, waiting: 1 },
}
const worstStart_s = 30

const stateWords: Readonly<Record<State, string>> = {
  starting: 'start',
  resting: 'resting',
  scanning: 'scanning',
  writing: 'writing',
  waiting: 'sleeping',
}

/** Reads the load figures of placed parts; parts of one model share the answer. */
export class CurrentReader {
  readonly #build: ResolvedBuild
  readonly #known = new Map<ResolvedPart['model'], readonly RailCurrents[]>()

  constructor(build: ResolvedBuild) {
    this.#build = build
  }

  /** One entry for each rail that the part loads. */
  read({ model }: ResolvedPart): readonly RailCurrents[] {
    const known = this.#known.get(model)
    if (known) return known
    const byClass = model.class === undefined ? undefined : this.#build.catalog.classes.get(model.class)?.load
    const read = rails.flatMap((rail) => {
      const load = model.load?.[rail]
      return load ? [readRail(rail, load, byClass?.[rail])] : []
    })
    this.#known.set(model, read)
    return read
  }
}

function readRail(rail: Rail, load: RailLoad, inClass: RailLoad | undefined): RailCurrents {
  const take = (state: State, quantity: Quantity, ofClass: Quantity | undefined) =>
    takeLoad(quantity, ofClass, worst_A[rail][state], `${stateWords[state]} current on ${lineName[rail]}`, 'A')
  const resting = take('resting', load.rest_A, inClass?.rest_A)
  const scanning = take('scanning', load.scan_A, inClass?.scan_A)
  return {
    rail,
    inState: {
      resting,
      scanning,
      writing: load.write_A ? take('writing', load.write_A, inClass?.write_A) : scanning,
      waiting: load.sleep_A ? take('waiting', load.sleep_A, inClass?.sleep_A) : resting,
      starting: load.start ? take('starting', load.start.peak_A, inClass?.start?.peak_A) : scanning,
    },
    start_s: load.start ? takeLoad(load.start.seconds, inClass?.start?.seconds, worstStart_s, 'start', 's').value : 0,
  }
}

/** A device with a motor: one that states a start on some rail. */
export const hasStart = ({ model }: ResolvedPart): boolean =>
  rails.some((rail) => model.load?.[rail]?.start !== undefined)

/** A drive with a motor. */
export const isMotorDrive = (part: ResolvedPart): boolean =>
  part.model.kind === 'drive' && part.model.drive?.rotation_rpm !== 0 && hasStart(part)

/** A drive without one. */
export const isSolidState = ({ model }: ResolvedPart): boolean =>
  model.kind === 'drive' && model.drive?.rotation_rpm === 0
