import { fileURLToPath } from 'node:url'
import tailwindcss from '@tailwindcss/vite'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vite'

/** Everything that is not the console is the service's, also under Vite's development server. */
const SERVICE_PATHS = ['/v1', '/docs', '/problems', '/cli', '/healthz', '/readyz']
const serviceUrl = process.env.SERVICE_URL ?? 'http://127.0.0.1:4310'

export default defineConfig({
  root: fileURLToPath(new URL('./console', import.meta.url)),
  plugins: [react(), tailwindcss()],
  build: {
    outDir: fileURLToPath(new URL('./dist/console', import.meta.url)),
    emptyOutDir: true,
    // The service's policy allows files of its own only: nothing is turned into a data: address.
    assetsInlineLimit: 0,
  },
  server: {
    host: '127.0.0.1',
    strictPort: true,
    proxy: Object.fromEntries(SERVICE_PATHS.map((path) => [path, { target: serviceUrl }])),
  },
})
