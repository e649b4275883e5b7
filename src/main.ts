import { VueQueryPlugin } from '@tanstack/vue-query'
import { createPinia } from 'pinia'
import { createApp } from 'vue'
import App from './App.vue'
import './assets/figures.css'
import './assets/fonts.css'
import './assets/page.css'
import './assets/palette.css'
import { createQueryClient } from './plugins/query.js'
import { createTheme } from './plugins/vuetify.js'
import { createAppRouter } from './router/index.js'
import { rememberedTheme } from './stores/appearance.js'
import { useSessionStore } from './stores/session.js'

const router = createAppRouter()
const queryClient = createQueryClient(() => {
  const session = useSessionStore()
  if (!session.person) return
  session.forget()
  queryClient.clear()
  void router.push({ name: 'sign-in', query: { next: router.currentRoute.value.fullPath } })
})

createApp(App)
  .use(createPinia())
  .use(createTheme(rememberedTheme()))
  .use(VueQueryPlugin, { queryClient })
  .use(router)
  .mount('#app')
