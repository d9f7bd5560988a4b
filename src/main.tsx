// Owns putting the program on the page.
// Must not know anything else.
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
// First, so that the style sheets of the places come after it and may differ from it.
import '@fontsource-variable/inter';
import '@fontsource-variable/jetbrains-mono';
import './ui/theme.css';
import { startApp } from './app/start-app.ts';
import { App } from './ui/App.tsx';

void startApp();

const root = document.getElementById('root');
if (root !== null) {
  createRoot(root).render(
    <StrictMode>
      <App />
    </StrictMode>,
  );
}
