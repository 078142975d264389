/** What stands where the maps will be while there is no scan. */
import { Button } from 'react-aria-components';
import { useSession } from '../workbench-context';
import styles from './empty-screen.module.css';

export function EmptyScreen({ onOpen }: { readonly onOpen: () => void }): React.JSX.Element {
  const running = useSession((session) => session.running);
  if (running !== null) return <p className={styles.words}>{running.label} …</p>;
  return (
    <div className={styles.words}>
      <p>
        Drop a scan here: HDF5, npy, npz, a TIFF stack, text or JCAMP-DX. Nothing leaves this
        machine.
      </p>
      <Button className={styles.open ?? ''} onPress={onOpen}>
        Open a scan
      </Button>
    </div>
  );
}
