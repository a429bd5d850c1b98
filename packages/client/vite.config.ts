import { fileURLToPath } from 'node:url';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vite';

/** Where the development server finds the application's own server. */
const server = process.env['STILLROOM_SERVER'] ?? 'http://127.0.0.1:7070';

export default defineConfig({
  root: fileURLToPath(new URL('.', import.meta.url)),
  plugins: [vue()],
  resolve: {
    alias: { '@': fileURLToPath(new URL('src', import.meta.url)) },
    conditions: ['development', 'module', 'browser', 'import', 'default'],
  },
  build: {
    target: 'es2022',
    // The content policy allows no inline script and no data: font.
    modulePreload: { polyfill: false },
    assetsInlineLimit: 0,
    chunkSizeWarningLimit: 1500,
  },
  worker: { format: 'es' },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': server, '/live': { target: server.replace('http', 'ws'), ws: true } },
  },
});
