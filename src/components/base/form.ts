import type { InjectionKey, Ref } from 'vue'

/** What a form and its fields say to each other beyond PrimeVue's own states. */
export interface FormContext {
  /** What the server refused, by field. */
  refused: Ref<Record<string, string>>
  register(name: string): void
  /** The field was changed: the refusal no longer holds. */
  settle(name: string): void
}

export const formKey: InjectionKey<FormContext> = Symbol('form')

/** What a labelled control needs to be read as labelled, described and invalid. */
export interface ControlProps {
  id: string
  'aria-describedby': string | undefined
  'aria-invalid': boolean | undefined
  'aria-required': boolean | undefined
}
