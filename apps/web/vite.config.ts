import react from '@vitejs/plugin-react';
import { defaultClientConditions, defineConfig } from 'vite';

const apiPort = process.env['API_PORT'] ?? '3000';

export default defineConfig({
  plugins: [react()],
  // Setting conditions replaces Vite's own list, so the defaults are repeated.
  resolve: { conditions: ['@faintward/source', ...defaultClientConditions] },
  // Fonts as data: URLs would need a wider content security policy.
  build: { assetsInlineLimit: 0 },
  server: {
    host: '127.0.0.1',
    port: 5173,
    strictPort: true,
    proxy: { '/api': `http://127.0.0.1:${apiPort}` },
  },
});
