import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

/** The window's build: plain files that any host can serve, nothing inline, nothing from outside. */
export default defineConfig({
  root: 'renderer',
  base: './',
  plugins: [react()],
  css: { modules: { localsConvention: 'camelCaseOnly' } },
  build: {
    outDir: '../dist/renderer',
    emptyOutDir: true,
    target: 'chrome120',
    sourcemap: true,
    // Pictures and fonts as files: the content policy allows no data: addresses.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    chunkSizeWarningLimit: 2000,
  },
});
