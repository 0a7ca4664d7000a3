import { defineConfig } from 'vite';

// Every asset is a file of its own with a hash in its name: the content security policy allows no data: address,
// and hashed files may be cached for a year.
export default defineConfig({
  oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
  build: {
    target: 'es2022',
    outDir: 'dist',
    assetsDir: 'assets',
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
  },
});
