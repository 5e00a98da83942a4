import { defineConfig } from 'vite';

// Nothing is inlined: the server's content policy takes files of its own only, no data: addresses.
export default defineConfig({
  root: import.meta.dirname,
  build: { outDir: '../dist/web', emptyOutDir: true, sourcemap: false, assetsInlineLimit: 0 },
  server: { proxy: { '/api': 'http://127.0.0.1:4680', '/calendars': 'http://127.0.0.1:4680' } },
});
