// Owns putting the program on the page.
// Must not know anything else.
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { startApp } from './app/start-app.ts';
import { App } from './ui/App.tsx';
import './ui/theme.css';

void startApp();

const root = document.getElementById('root');
if (root !== null) {
  createRoot(root).render(
    <StrictMode>
      <App />
    </StrictMode>,
  );
}
