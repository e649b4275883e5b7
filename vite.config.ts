import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vite'
import vuetify from 'vite-plugin-vuetify'

/** The client. In development the API of the server process is reached through the same address. */
export default defineConfig({
  plugins: [vue(), vuetify({ autoImport: true })],
  build: { outDir: 'dist/client', emptyOutDir: true, target: 'es2023', assetsInlineLimit: 0 },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': process.env['TIERLIGHT_API_ADDRESS'] ?? 'http://127.0.0.1:4180' },
  },
})
