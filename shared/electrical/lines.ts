import type { Line } from '../quantity/rails.ts'

/** Place of each line in arrays by line, in the order of `lines`. */
export const lineIndex: Readonly<Record<Line, number>> = { '12V': 0, '5V': 1, '3.3V': 2, return: 3 }
export const returnIndex = lineIndex.return

/** A line as it is read: "12 V". */
export const lineName: Readonly<Record<Line, string>> = {
  '12V': '12 V',
  '5V': '5 V',
  '3.3V': '3.3 V',
  return: 'return',
}
