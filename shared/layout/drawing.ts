/**
 * The arrangement of a diagram as plain geometry: what the canvas shows and the flat drawing prints.
 *
 * Power grows from the left, data from the right, and the strip of bays stands in the middle. A part that lives on
 * the data side but takes power (a breakout's power tails, a board's main inlet) is drawn a second time on the
 * power side as a small stub with the same reference designation, so no run ever crosses the strip.
 */

export type DrawnNodeKind =
  /** A tag: supply, lead, splitter, adapter, breakout, cable, controller, expander, board, fan, load. */
  | 'part'
  /** A drive in its bay: one row of the strip. Without `slot`: a drive that has no bay yet, in a row of its own. */
  | 'drive-row'
  /** A bay with nothing in it. */
  | 'empty-bay'
  /** The case: the frame of the strip with its name and cages. */
  | 'case'
  /** A backplane: a frame around the rows that it serves, power inlets on its left edge, data on its right. */
  | 'backplane'
  /** A power inlet of a part on the data side, drawn in the power loom. */
  | 'stub'

/** A connector as it is drawn: a stub on the edge of its node, in the physical order of the part. */
export interface DrawnPort {
  /** Unique within the node; `connector`, or `connector:power` / `connector:data` where one connector shows on both sides. */
  key: string
  connector: string
  carries: 'power' | 'data' | 'both'
  side: 'left' | 'right'
  /** Place relative to the node's top left corner, in pixels at zoom 1. */
  x: number
  y: number
  label: string
  /** As its standard tells: a plug is drawn filled, a receptacle open. */
  gender: 'plug' | 'receptacle'
  joined: boolean
}

export interface DrawnNode {
  /** Part id; `part~connector` for stubs; `case#slot` for empty bays (`backplane#bay` where no case holds it). */
  id: string
  kind: DrawnNodeKind
  part: string
  x: number
  y: number
  width: number
  height: number
  ports: DrawnPort[]
  /** Bay number, for rows and empty bays. */
  slot?: number
  cage?: string
  /** One line high: one connector on either side, level with the middle, and no room for their labels. */
  compact?: true
  /** Cases: names of cages, relative to the node, where the text begins. */
  headings?: { text: string; x: number; y: number }[]
}

export interface DrawnRun {
  /**
   * Joint id, one run for each. Where a joint carries both, the run of that id is its data, and
   * `inner:part:connector` its power: the stretch between a cable's stub and its drive, or a backplane's seat.
   */
  id: string
  /** The joint whose currents or lanes it shows. */
  joint?: string
  kind: 'joint' | 'inner' | 'seat'
  carries: 'power' | 'data'
  from: { node: string; port: string }
  to: { node: string; port: string }
  /** Points that lead the run clear of the tags of columns that it passes, in order from `from`. */
  via?: { x: number; y: number }[]
  /** Where the run turns in each gap between columns that it crosses, counted from `from`. Absent: in the middle. */
  bends?: number[]
}

export interface Drawing {
  nodes: DrawnNode[]
  runs: DrawnRun[]
  bounds: { x: number; y: number; width: number; height: number }
}
