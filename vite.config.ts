import tailwind from '@tailwindcss/vite'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vite'

// In development the API is a process of its own (API_URL). changeOrigin stays off, so that it sees the Host and the
// Origin of the page and its same-origin check holds as it does in production.
const api = { target: process.env.API_URL ?? 'http://127.0.0.1:7300', changeOrigin: false }

export default defineConfig({
  plugins: [react(), tailwind()],
  server: {
    host: '127.0.0.1',
    proxy: { '/api': api, '/auth': api, '/docs': api, '/healthz': api },
  },
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    // The content security policy allows fonts and pictures from our own origin only, never from data: URLs.
    assetsInlineLimit: 0,
  },
})
