import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'middleware' }),
  integrations: [react()],
  devToolbar: { enabled: false },
  // The HTTP front checks Host and Origin itself (ops/http): Astro's check knows form content types only.
  security: { checkOrigin: false },
  vite: {
    plugins: [tailwindcss()],
    ssr: { external: ['mysql2', 'knex', '@node-rs/argon2', 'pdfmake', 'pino'] },
    // The manifest tells pages which scripts an island needs (src/layouts/islandScripts.ts).
    build: {
      chunkSizeWarningLimit: 1200,
      manifest: true,
      // Scripts stay in files: the content security policy (ops/http/contentSecurity.ts) lets no others run.
      assetsInlineLimit: (path) => (/\.m?js$/.test(path) ? false : undefined),
    },
  },
});
