import './zodWithoutEval.ts'
import './assets/fonts.css'
import './assets/tokens.css'
import './assets/base.css'
import { QueryClient, VueQueryPlugin } from '@tanstack/vue-query'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { createApp } from 'vue'
import App from './App.vue'
import { connectSession } from './api/client.ts'
import { NetworkError } from './api/errors.ts'
import { preset } from './assets/preset.ts'
import { reportCrash } from './composables/useCrash.ts'
import { makeRouter } from './router/index.ts'
import { useSessionStore } from './stores/session.ts'

const app = createApp(App)
const router = makeRouter()
app.config.errorHandler = reportCrash
router.onError(reportCrash)

app.use(createPinia())
const session = useSessionStore()
connectSession({
  csrfToken: () => session.session?.csrfToken ?? '',
  renewToken: session.renewToken,
  signInAgain: session.signInAgain,
})

app.use(PrimeVue, { theme: { preset, options: { darkModeSelector: 'none', cssLayer: false } } })
app.use(VueQueryPlugin, {
  queryClient: new QueryClient({
    defaultOptions: {
      queries: {
        networkMode: 'always',
        staleTime: 10_000,
        retry: (tries, error) => error instanceof NetworkError && tries < 2,
      },
      mutations: { networkMode: 'always' },
    },
  }),
})
app.use(router)
app.mount('#app')
