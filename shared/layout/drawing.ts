/**
 * The arrangement of a diagram as plain geometry: what the canvas shows and the flat drawing prints.
 *
 * Power grows from the left, data from the right, and the strip of bays stands in the middle. A part that lives on
 * the data side but takes power (a breakout's power tails, a board's main inlet) is drawn a second time on the
 * power side as a small stub with the same reference designation, so no run ever crosses the strip.
 */

export type DrawnNodeKind =
  /** A tag: supply, lead, splitter, adapter, breakout, cable, controller, expander, board, fan, load, loose drive. */
  | 'part'
  /** A drive in its bay: one row of the strip. */
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
  /** Part id; `part~connector` for stubs; `case#slot` for empty bays. */
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
}

export interface DrawnRun {
  /** Joint id; `inner:part:connector` for the stretch of a cable between its stub and its drive. */
  id: string
  joint?: string
  kind: 'joint' | 'inner' | 'seat'
  carries: 'power' | 'data'
  from: { node: string; port: string }
  to: { node: string; port: string }
}

export interface Drawing {
  nodes: DrawnNode[]
  runs: DrawnRun[]
  bounds: { x: number; y: number; width: number; height: number }
}
