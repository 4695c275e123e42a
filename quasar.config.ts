import { defineConfig } from '#q-app/wrappers';

export default defineConfig(() => {
  const apiPort = process.env.API_PORT ?? '8081';
  return {
    boot: ['session'],
    css: ['app.scss'],
    extras: [], // fonts in src/css/_fonts.scss, icons drawn by us: nothing from a font set
    build: {
      target: { browser: ['es2022'], node: 'node20' },
      vueRouterMode: 'history',
      typescript: { strict: true, vueShim: true },
      distDir: 'dist/spa',
    },
    devServer: {
      host: '127.0.0.1', // the demo accounts' password is known: nobody else may reach them
      port: Number(process.env.WEB_PORT ?? 9000),
      open: false,
      proxy: { '/api': { target: `http://127.0.0.1:${apiPort}`, changeOrigin: false } },
    },
    framework: { config: { dark: 'auto' }, lang: 'en-US', plugins: ['Notify', 'Dark'] },
    animations: [],
  };
});
