import type { Controller, Model } from '#shared/catalog/model.ts'
import { kindName } from './kinds.ts'

export interface Trait {
  what: string
  words: string
}

const spinUpMeans = {
  controller: 'the controller',
  'device-pin': 'contact 11',
  'standby-command': 'a standby command',
} as const

export const powerDisableWords = {
  yes: 'yes: stays off while contact 3 carries 3.3 V',
  no: 'no',
  unknown: 'not known',
} as const

export const constructionWords = {
  crimped: 'crimped contacts',
  'insulation-displacement': 'wires pressed into the plug',
  moulded: 'moulded in one piece',
  board: 'a printed board',
  unknown: 'not known',
} as const

const directions = {
  forward: 'forward: multilane end at the controller',
  reverse: 'reverse: legs at single ports, multilane end at the backplane',
  symmetric: 'the same both ways',
} as const

const list = (words: readonly string[], none: string): string => (words.length > 0 ? words.join(', ') : none)

/** Facts of a model that are no figures, in words, in the order a builder asks. */
export function traitsOf(model: Model, className: string | undefined): Trait[] {
  const { drive, supply, cable, expander } = model
  const traits: (Trait | undefined)[] = [
    { what: 'Kind', words: kindName(model.kind) },
    className ? { what: 'Class', words: className } : undefined,
    drive && { what: 'Size', words: drive.size === 'M.2' ? 'M.2' : `${drive.size} in` },
    drive && {
      what: 'Protocol',
      words: `${drive.protocol.toUpperCase()}, ${drive.ports === 2 ? 'two ports' : 'one port'}`,
    },
    drive && { what: 'Rotation', words: drive.rotation_rpm === 0 ? 'solid state' : `${drive.rotation_rpm} rpm` },
    drive?.pcie && { what: 'PCI Express', words: `${drive.pcie.lanes} lanes, generation ${drive.pcie.generation}` },
    drive?.sectors && {
      what: 'Sectors',
      words: `${drive.sectors.logical_B} bytes logical, ${drive.sectors.physical_B} physical`,
    },
    drive && { what: 'Kept off by 3.3 V on contact 3', words: powerDisableWords[drive.powerDisable] },
    drive && drive.rotation_rpm > 0
      ? {
          what: 'Start can be delayed by',
          words: list(
            drive.startControl.map((by) => spinUpMeans[by]),
            'nothing known',
          ),
        }
      : undefined,
    supply && {
      what: 'Stated tolerance holds',
      words: supply.toleranceAt === 'socket' ? 'at its sockets' : 'at the end of its own leads',
    },
    model.pinoutFamily ? { what: 'Pinout family', words: model.pinoutFamily } : undefined,
    model.construction && { what: 'Made as', words: constructionWords[model.construction] },
    cable && { what: 'Direction', words: directions[cable.direction] },
    ...model.controllers.flatMap(controllerTraits),
    expander && {
      what: 'Protocols',
      words: list(
        expander.protocols.map((one) => one.toUpperCase()),
        'none',
      ),
    },
    expander && {
      what: 'Start can be delayed by',
      words: list(
        expander.startControl.map((by) => spinUpMeans[by]),
        'nothing known',
      ),
    },
    { what: 'Id', words: model.id },
  ]
  return traits.filter((trait): trait is Trait => trait !== undefined)
}

function controllerTraits(controller: Controller): Trait[] {
  const { uplink } = controller
  return [
    {
      what: `Protocols, ${controller.name}`,
      words: list(
        controller.protocols.map((one) => one.toUpperCase()),
        'none',
      ),
    },
    { what: `Modes, ${controller.name}`, words: list(controller.modes, 'none') },
    ...(uplink
      ? [{ what: `Way up, ${controller.name}`, words: `${uplink.lanes} lanes, PCI Express ${uplink.generation}` }]
      : []),
    ...(controller.sectors_B
      ? [{ what: `Sectors, ${controller.name}`, words: `${controller.sectors_B.join(', ')} bytes` }]
      : []),
    {
      what: `Staged start, ${controller.name}`,
      words: list(
        controller.startControl.map((by) => spinUpMeans[by]),
        'not offered',
      ),
    },
  ]
}
