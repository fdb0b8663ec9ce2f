import { formatWire, millimetresPerInch, scaleQuantity, type Unit } from '#shared/quantity/display.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'
import { usePreferencesStore } from '../stores/preferences.ts'

/** Figures in the units that this person prefers. */
export function useUnits() {
  const preferences = usePreferencesStore()

  /** A figure as it is to be shown: lengths may turn into inches, everything else stays. */
  function shown(quantity: Quantity, unit: Unit): { quantity: Quantity; unit: Unit } {
    return unit === 'mm' && preferences.length === 'in'
      ? { quantity: scaleQuantity(quantity, 1 / millimetresPerInch), unit: 'in' }
      : { quantity, unit }
  }

  const wire = (size: { awg?: number; area_mm2?: Quantity }): string | undefined =>
    formatWire({ awg: size.awg, area_mm2: size.area_mm2?.value }, preferences.wire)

  return { shown, wire }
}
