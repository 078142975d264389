/** Bottom line: the engine, and where the cursor is on the sample and on the energy axis. */
import { energyInWords, placeInWords } from '../../state/cursor-place';
import { useCrosshair, useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import styles from './footer.module.css';
import { RunningBar } from './running-bar';

export function Footer(): React.JSX.Element {
  const { engine } = useWorkbench();
  const scan = useSession((session) => session.scan);
  const overview = scan?.open.overview ?? null;
  return (
    <footer className={styles.footer}>
      <span>
        engine {engine.workerCount} {engine.workerCount === 1 ? 'worker' : 'workers'}
      </span>
      {overview !== null && <span>cube {megabytes(overview.countsBytes)}</span>}
      <RunningBar />
      <span className={styles.grow} />
      <Place />
      <Energy />
    </footer>
  );
}

function Place(): React.JSX.Element | null {
  const pixel = useCrosshair();
  const scan = useSession((session) => session.scan);
  if (pixel === null || scan === null) return null;
  return <span data-testid="place">{placeInWords(scan.open.plan.meta, pixel)}</span>;
}

function Energy(): React.JSX.Element | null {
  const energyEv = useView((view) => view.cursorEv);
  const scan = useSession((session) => session.scan);
  const medium = useRecipe((document) => document.scan?.axis?.medium ?? 'air');
  if (energyEv === null || scan === null) return null;
  const { laserEv } = scan.open.plan.meta;
  return <span data-testid="energy">{energyInWords(energyEv, laserEv, medium)}</span>;
}

function megabytes(bytes: number): string {
  const size = bytes / 2 ** 20;
  return `${size < 10 ? size.toFixed(1) : size.toFixed(0)} MB`;
}
