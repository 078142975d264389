/** Stands in for the screen when drawing it failed: says so, and that the work is kept. */
import { Component } from 'react';
import styles from './mishap.module.css';

interface State {
  readonly message: string | null;
}

export class Mishap extends Component<{ readonly children: React.ReactNode }, State> {
  override state: State = { message: null };

  static getDerivedStateFromError(error: unknown): State {
    return { message: error instanceof Error ? error.message : String(error) };
  }

  override render(): React.ReactNode {
    const { message } = this.state;
    if (message === null) return this.props.children;
    return (
      <div className={styles.mishap} role="alert">
        <h1>The screen could not be drawn</h1>
        <p>
          A fault of the program: <code>{message}</code>
        </p>
        <p>The recipe is kept. Reload the page to go on.</p>
        <button type="button" onClick={() => window.location.reload()}>
          Reload
        </button>
      </div>
    );
  }
}
