import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig, passthroughImageService } from 'astro/config';

const publicUrl = process.env.PUBLIC_URL ?? 'http://127.0.0.1:4321';
const { protocol, hostname, port } = new URL(publicUrl);

/** Bundles the server's own entry with the pages, so that both share one copy of every module. */
const ownEntry = {
  name: 'own-entry',
  hooks: {
    'astro:build:setup': ({ vite, target }) => {
      if (target !== 'server') return;
      vite.build.rollupOptions.input = [
        vite.build.rollupOptions.input ?? [],
        'src/server.ts',
        'src/adapters/images/heic-worker.mjs',
      ].flat();
    },
  },
};

export default defineConfig({
  site: publicUrl,
  output: 'server',
  adapter: node({ mode: 'middleware' }),
  integrations: [react(), ownEntry],
  trailingSlash: 'never',
  image: { service: passthroughImageService() },
  build: { inlineStylesheets: 'never' },
  security: {
    checkOrigin: true,
    allowedDomains: [{ protocol: protocol.slice(0, -1), hostname, ...(port ? { port } : {}) }],
  },
  devToolbar: { enabled: false },
  server: { host: '127.0.0.1', port: Number(process.env.PORT ?? 4321) },
  session: { driver: 'memory' },
  experimental: {
    csp: {
      algorithm: 'SHA-256',
      directives: [
        "default-src 'none'",
        "base-uri 'none'",
        "form-action 'self'",
        "frame-ancestors 'none'",
        "font-src 'self'",
        "manifest-src 'self'",
        "worker-src 'self'",
      ],
      scriptDirective: { resources: ["'self'"] },
      styleDirective: { resources: ["'self'"] },
    },
  },
  vite: {
    plugins: [tailwindcss()],
    server: { watch: { ignored: ['**/storage/**', '**/dist/**'] } },
    build: { assetsInlineLimit: 0 },
  },
});
