import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig, envField } from 'astro/config';

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'standalone' }),
  integrations: [react()],
  devToolbar: { enabled: false },
  // Any host name may serve the app; a foreign Origin is refused by src/middleware.ts for every method and body type. The
  // framework's own check knows only forms, refuses scripts with a bearer token, and answers without headers or JSON.
  security: { checkOrigin: false, allowedDomains: [{}] },
  env: {
    schema: {
      DATABASE_URL: envField.string({ context: 'server', access: 'secret', optional: true }),
      DATABASE_AUTH_TOKEN: envField.string({ context: 'server', access: 'secret', optional: true }),
      APP_ORIGIN: envField.string({ context: 'server', access: 'secret', optional: true }),
    },
  },
  experimental: {
    csp: {
      directives: [
        "default-src 'self'",
        "img-src 'self' data:",
        "font-src 'self'",
        "connect-src 'self'",
        "object-src 'none'",
        "base-uri 'none'",
        "form-action 'self'",
        "worker-src 'self'",
        "frame-ancestors 'none'",
      ],
    },
  },
  vite: {
    plugins: [tailwindcss()],
    ssr: { external: ['@node-rs/argon2', '@libsql/client', 'libsql'] },
  },
});
