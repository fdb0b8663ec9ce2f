import { explain } from '../components/base/explain.ts'
import { useNotices } from './useNotices.ts'

/** Runs an act that has no form of its own; a refusal is said in a notice, never passed over. */
export function useAttempt() {
  const { notify } = useNotices()
  return async (act: () => Promise<unknown>, failed: string): Promise<boolean> => {
    try {
      await act()
      return true
    } catch (error) {
      const told = explain(error)
      notify(`${failed} ${told.detail ?? told.title}`)
      return false
    }
  }
}
