import { inject, type InjectionKey, type Ref, type ShallowRef } from 'vue'
import type { OpenBuild } from '../../api/builds.ts'
import type { SaveState } from '../../stores/save/state.ts'

/** What the faces of an opened build read from the view that they stand in. The document itself is in the stores. */
export interface OpenBuildContext {
  buildId: string
  /** As the server gave it when the build was opened; null while it cannot be reached. */
  summary: Readonly<ShallowRef<OpenBuild | null>>
  state: Readonly<Ref<SaveState | null>>
  /**
   * Carries out what changes the build on the server beside the edits; `words` name it, for the undo too. Absent where
   * the build only stands there to be read.
   */
  carryOut?: (words: string, act: (base: number) => Promise<unknown>) => Promise<void>
}

export const openBuildKey: InjectionKey<OpenBuildContext> = Symbol('open build')

export function useOpenBuild(): OpenBuildContext {
  const context = inject(openBuildKey)
  if (!context) throw new Error('a face stands in a BuildView')
  return context
}
