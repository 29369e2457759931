import { Component, type ReactNode } from 'react';
import type { Candling } from '../store/candling.ts';

interface Props {
  readonly candling: Candling;
  readonly children: ReactNode;
}

/** A bug in drawing shows as one; the session is saved after every change and is not lost. */
export class ErrorSurface extends Component<Props, { readonly error: Error | undefined }> {
  override state = { error: undefined };

  static getDerivedStateFromError(error: Error) {
    return { error };
  }

  override render() {
    const error: Error | undefined = this.state.error;
    if (error === undefined) return this.props.children;
    return (
      <main className="error-surface" role="alert">
        <h1>Something in Candling broke.</h1>
        <p>
          Your session was saved on this machine after your last change. Load the page again to go on where you were.
        </p>
        <p>
          <button type="button" className="button primary" onClick={() => globalThis.location.reload()}>
            Load the page again
          </button>
        </p>
        <details>
          <summary>For the developers</summary>
          <pre>
            Candling {this.props.candling.app}
            {'\n'}
            {(error as Error).stack}
          </pre>
        </details>
      </main>
    );
  }
}
