import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { z } from 'zod';
import { App } from '#src/app.tsx';
import { startTheme } from '#src/lib/theme.ts';
import '#src/styles.css';

// The content policy forbids code from strings, which zod would otherwise try for speed.
z.config({ jitless: true });
startTheme();

const root = document.getElementById('root');
if (!root) throw new Error('index.html has no #root');
createRoot(root).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
