import { watchEffect } from 'vue'
import { usePreferencesStore } from '../stores/preferences.ts'

/** Keeps the page's theme on the preference, which may follow the system. */
export function useTheme(): void {
  const preferences = usePreferencesStore()
  watchEffect(() => {
    document.documentElement.classList.toggle('dark', preferences.isDark)
  })
}
