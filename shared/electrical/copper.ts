/** Resistivity of annealed copper of 100 % IACS at 20 degC, ohm mm2/m: IEC 60028 [S58]. */
export const copperResistivity_ohm_mm2_per_m = 0.017241
/** Change of resistance per kelvin, referred to 20 degC: IEC 60028. */
export const copperCoefficient_per_K = 0.00393
const reference_C = 20

/** Resistivity of copper at a temperature, ohm mm2/m. */
export const resistivity_ohm_mm2_per_m = (temperature_C: number): number =>
  copperResistivity_ohm_mm2_per_m * (1 + copperCoefficient_per_K * (temperature_C - reference_C))

/** Diameter of a solid wire of an American wire gauge: 0.005 in times 92^((36 - n) / 39) [S57]. */
export const awgDiameter_mm = (awg: number): number => 0.127 * 92 ** ((36 - awg) / 39)

/** Conducting area of a gauge. */
export const awgArea_mm2 = (awg: number): number => (Math.PI / 4) * awgDiameter_mm(awg) ** 2

/** The thickest whole gauge that an area still reaches: what a wire given in mm2 counts as in tables by gauge. */
export function gaugeOfArea(area_mm2: number): number {
  for (let awg = 0; awg < 40; awg++) if (awgArea_mm2(awg) <= area_mm2 * (1 + 1e-9)) return awg
  return 40
}

/** Resistance of equal copper wires in parallel: rho(T) L / (A n). */
export const wireResistance_ohm = (length_mm: number, area_mm2: number, wires: number, temperature_C: number): number =>
  (resistivity_ohm_mm2_per_m(temperature_C) * length_mm) / 1000 / (area_mm2 * wires)
