export interface Area {
  x: number
  y: number
  width: number
  height: number
}

const overlap = (a: Area, b: Area): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height

const band = 64

/** Remembers what is taken on the sheet, by horizontal bands so that asking stays cheap on a long one. */
export function occupancy() {
  const bands = new Map<number, Area[]>()
  const bandsOf = ({ y, height }: Area): number[] => {
    const first = Math.floor(y / band)
    const count = Math.floor((y + height) / band) - first + 1
    return Array.from({ length: count }, (_, i) => first + i)
  }
  return {
    isFree: (area: Area): boolean =>
      bandsOf(area).every((index) => !(bands.get(index) ?? []).some((other) => overlap(area, other))),
    add(area: Area): void {
      for (const index of bandsOf(area)) {
        const list = bands.get(index)
        if (list) list.push(area)
        else bands.set(index, [area])
      }
    },
  }
}
