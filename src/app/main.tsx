import '@fontsource-variable/source-sans-3/wght.css';
import '@fontsource/stix-two-text/latin-400-italic.css';
import '@fontsource/stix-two-text/greek-400-italic.css';
import './tokens.css';
import './base.css';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { createJobs } from '../jobs/candling-jobs.ts';
import { createCandling } from '../store/candling.ts';
import { createSessionStorage } from '../store/session-storage.ts';
import { CandlingContext } from '../store/use-candling.ts';
import { createWritingLock } from '../store/writing-lock.ts';
import { App } from './App.tsx';
import { ErrorSurface } from './ErrorSurface.tsx';

const candling = createCandling({
  jobs: createJobs(),
  storage: createSessionStorage(),
  lock: createWritingLock(),
  app: __APP_VERSION__,
  now: () => new Date(),
  newId: () => globalThis.crypto.randomUUID(),
});

createRoot(document.getElementById('root')!).render(
  <StrictMode>
    <ErrorSurface candling={candling}>
      <CandlingContext value={candling}>
        <App />
      </CandlingContext>
    </ErrorSurface>
  </StrictMode>,
);
