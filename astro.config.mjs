import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig, envField } from 'astro/config';
import auth from 'auth-astro';

/** Everything the server reads from its environment; `.env.example` lists the same names. All are read at run time. */
const secret = { context: 'server', access: 'secret' };

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'standalone' }),
  integrations: [react(), auth({ configFile: './src/lib/server/auth/config.ts' })],
  vite: { plugins: [tailwindcss()] },
  devToolbar: { enabled: false },
  server: { host: '127.0.0.1', port: 4321 },
  security: {
    checkOrigin: true,
    // A reverse proxy's names are added at build time; loopback is always served.
    allowedDomains: [
      { hostname: 'localhost' },
      { hostname: '127.0.0.1' },
      ...(process.env.ALLOWED_HOSTS ?? '')
        .split(',')
        .filter(Boolean)
        .map((hostname) => ({ hostname: hostname.trim() })),
    ],
  },
  experimental: { csp: true },
  env: {
    validateSecrets: false,
    schema: {
      HOST: envField.string({ ...secret, default: '127.0.0.1' }),
      PORT: envField.number({ ...secret, default: 4321 }),
      DATABASE_URL: envField.string({ ...secret, url: true }),
      AUTH_SECRET: envField.string({ ...secret, min: 32 }),
      PUBLIC_ORIGIN: envField.string({ ...secret, optional: true, url: true }),
      LOG_LEVEL: envField.enum({ ...secret, values: ['debug', 'info', 'warn', 'error', 'silent'], default: 'info' }),
    },
  },
});
