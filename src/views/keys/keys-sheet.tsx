/** The sheet of all keys; it can be printed. */
import { X } from 'lucide-react';
import { Button, Dialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { heldKeyOn, keyLines } from './key-lines';
import styles from './keys-sheet.module.css';

interface Props {
  readonly isOpen: boolean;
  readonly onClose: () => void;
}

export function KeysSheet({ isOpen, onClose }: Props): React.JSX.Element {
  return (
    <ModalOverlay
      className={styles.overlay ?? ''}
      isOpen={isOpen}
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      isDismissable
    >
      <Modal className={styles.modal ?? ''}>
        <Dialog className={styles.sheet ?? ''}>
          <header>
            <Heading slot="title">Keys</Heading>
            <Button onPress={() => window.print()}>Print</Button>
            <Button slot="close" aria-label="Close">
              <X size={14} aria-hidden="true" />
            </Button>
          </header>
          <div className={styles.groups}>
            {keyLines(heldKeyOn(navigator.platform)).map(({ group, lines }) => (
              <section key={group}>
                <h3>{group}</h3>
                <dl>
                  {lines.map(({ keys, words }) => (
                    <div key={words}>
                      <dt>
                        {keys.map((key) => (
                          <kbd key={key}>{key}</kbd>
                        ))}
                      </dt>
                      <dd>{words}</dd>
                    </div>
                  ))}
                </dl>
              </section>
            ))}
          </div>
        </Dialog>
      </Modal>
    </ModalOverlay>
  );
}
