import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';

const appUrl = new URL(process.env.APP_URL ?? 'http://127.0.0.1:4321');
const hosts = [...new Set(['localhost', '127.0.0.1', appUrl.hostname])];

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'middleware' }),
  integrations: [react()],
  devToolbar: { enabled: false },
  // The origin check is src/server/http/origin.ts: it covers every content type, and answers with all headers.
  security: { checkOrigin: false, allowedDomains: hosts.map((hostname) => ({ hostname })) },
  experimental: {
    csp: {
      directives: [
        "default-src 'none'",
        "img-src 'self' data:",
        "font-src 'self'",
        "connect-src 'self'",
        "form-action 'self'",
        "base-uri 'none'",
        "object-src 'none'",
        "frame-ancestors 'none'",
        "manifest-src 'self'",
      ],
    },
  },
  // The highlighter colours by inline styles, which the policy above refuses; formulas need no colours.
  markdown: { syntaxHighlight: false },
  vite: { plugins: [tailwindcss()] },
});
