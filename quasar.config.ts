import { defineConfig } from '#q-app/wrappers';

/**
 * The browser build: a single-page application without inline scripts, so that the server may send
 * a strict Content-Security-Policy.
 */
export default defineConfig(() => ({
  boot: [],
  css: ['fonts.css', 'tokens.css', 'base.css', 'quasar.css'],
  extras: [],
  framework: {
    iconSet: 'svg-mdi-v7',
    config: { dark: false },
    plugins: ['Dialog', 'Notify'],
  },
  build: {
    target: { browser: ['es2022', 'firefox115', 'chrome115', 'safari16'], node: 'node20' },
    vueRouterMode: 'history',
    distDir: 'dist/spa',
    typescript: { strict: true },
    extendViteConf(vite) {
      vite.build ??= {};
      // A data: URL would be outside the content policy, so every asset stays a file.
      vite.build.assetsInlineLimit = 0;
      vite.build.modulePreload = { polyfill: false };
    },
  },
  devServer: {
    host: '127.0.0.1',
    port: Number(process.env['HEDDLE_DEV_PORT'] ?? 9000),
    open: false,
    proxy: {
      '/api': { target: process.env['HEDDLE_DEV_API'] ?? 'http://127.0.0.1:4810' },
    },
  },
}));
