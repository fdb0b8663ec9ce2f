/** Sizes of the arrangement, in pixels at zoom 1. All lie on the 4 px grid. */
export const grid = 4

/** Tags: supply, lead, splitter, breakout, controller and so on. */
export const tag = {
  width: 164,
  supplyWidth: 204,
  /** Designation, and the name in up to two lines. */
  header: 36,
  portPitch: 20,
  footer: 4,
  /** Lines of rail figures that stand beside a supply's sockets. */
  supplyLines: 5,
  /** A part with one connector on either side is one line high, so that a column of them keeps step with the rows. */
  compactHeight: 36,
} as const

/** A power inlet of a part on the data side. */
export const stub = { width: 92, height: 28, portPitch: 20 } as const

/** The strip of bays. */
export const strip = {
  rowWidth: 248,
  rowHeight: 44,
  rowGap: 4,
  framePad: 12,
  caseHeader: 32,
  cageHeader: 24,
  cageGap: 8,
  backplaneHeader: 24,
  backplanePad: 8,
  /** Room between a backplane's edge and its rows, where the seats are drawn. */
  gutter: 28,
  /** Inset of a seat's contact from the backplane's edge. */
  seatInset: 12,
  stackGap: 48,
} as const

/** The looms on both sides. */
export const loom = {
  /** Between two columns, and between the last column and the strip: room for a curve and its amperes. */
  columnGap: 92,
  /** Between supplies and what they feed: many thick runs part here. */
  supplyGap: 128,
  /** Between the tails of cables and their drives: nothing is written there. */
  tailGap: 40,
  /** Between two tags of one column. */
  nodeGap: 16,
  /** Where at least one of the two is one line high. */
  compactGap: 12,
  /** Between a passing run and a tag. */
  laneGap: 12,
  /** Between two passing runs. */
  lanePitch: 16,
} as const

export const snap = (value: number): number => Math.round(value / grid) * grid
