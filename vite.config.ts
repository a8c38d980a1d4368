import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

export default defineConfig({
  root: 'src',
  plugins: [react(), tailwindcss()],
  build: { outDir: '../dist/client', emptyOutDir: true, target: 'es2022' },
  worker: { format: 'es' },
  server: { port: 4818, proxy: { '/api': 'http://127.0.0.1:4817' } },
});
