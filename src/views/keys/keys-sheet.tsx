/** The sheet of all keys; it can be printed. */
import { X } from 'lucide-react';
import { Button, Dialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { type KeyGroup, keyBindings, keyInWords, keysInPlace } from './key-bindings';
import styles from './keys-sheet.module.css';

interface Props {
  readonly isOpen: boolean;
  readonly onClose: () => void;
}

const groups: readonly KeyGroup[] = ['Document', 'Maps', 'Spectrum', 'Screen'];

export function KeysSheet({ isOpen, onClose }: Props): React.JSX.Element {
  const lines = [
    ...keyBindings.map((binding) => ({ ...binding, keys: keyInWords(binding) })),
    ...keysInPlace,
  ];
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
            {groups.map((group) => (
              <section key={group}>
                <h3>{group}</h3>
                <dl>
                  {lines
                    .filter((line) => line.group === group)
                    .map(({ keys, words }) => (
                      <div key={keys + words}>
                        <dt>
                          <kbd>{keys}</kbd>
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
