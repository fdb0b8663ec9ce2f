/**
 * Current of one wire in free air by gauge, the chassis-wiring column of the Handbook of Electronic Tables and
 * Formulas [S57]. A wire in a bundle or sleeve keeps a share of it (`settings.bundleFactor`, common practice).
 */
const chassis_A: readonly (readonly [awg: number, ampere: number, fromMemory?: true])[] = [
  [0, 245, true],
  [2, 181, true],
  [4, 135, true],
  [6, 101, true],
  [8, 73, true],
  [10, 55, true],
  [12, 41, true],
  [14, 32],
  [16, 22],
  [18, 16],
  [20, 11],
  [22, 7],
  [24, 3.5],
  [26, 2.2],
  [28, 1.4],
  [30, 0.86, true],
  [32, 0.53, true],
  [34, 0.33, true],
  [36, 0.21, true],
  [38, 0.13, true],
  [40, 0.09, true],
]

/** Chassis ampacity of one wire; a gauge between two rows takes the thinner row. */
export function chassisAmpacity(awg: number): { ampere: number; awg: number; fromMemory: boolean } {
  const row = chassis_A.find(([listed]) => listed >= awg) ?? chassis_A[chassis_A.length - 1]!
  return { ampere: row[1], awg: row[0], fromMemory: row[2] ?? false }
}
