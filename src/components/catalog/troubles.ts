import type { InjectionKey } from 'vue'

/** Figures that hold something else than a number, by label: the form does not save over them. */
export interface Troubles {
  set(label: string, wrong: boolean): void
}

export const troublesKey: InjectionKey<Troubles> = Symbol('troubles')
