import './without-made-code'
import { PiniaColada } from '@pinia/colada'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { createApp } from 'vue'
import { createWebHistory } from 'vue-router'
import { readSession } from '#shared/contracts/people'
import { call } from './api/call'
import { setSessionGate } from './api/session-gate'
import App from './App.vue'
import './assets/index.css'
import { createAppRouter } from './router'
import { useSessionStore } from './stores/session'
import { preset } from './theme'
import StartFailure from './layouts/StartFailure.vue'

async function start() {
  const app = createApp(App)
  app.use(createPinia())
  app.use(PiniaColada, {})
  app.use(PrimeVue, { ripple: false, theme: { preset, options: { darkModeSelector: 'none', cssLayer: { name: 'primevue', order: 'primevue' } } } })

  const session = useSessionStore()
  const { person } = await call(readSession)
  session.start(person)
  setSessionGate(session.askAgain)

  app.use(createAppRouter(createWebHistory()))
  app.mount('#app')
}

start().catch((failure: unknown) => {
  createApp(StartFailure, { message: failure instanceof Error ? failure.message : 'The program could not start.' }).mount('#app')
})
