/** A drop-down list of choices, in groups where there are several. */
import { ChevronDown } from 'lucide-react';
import { memo, useMemo } from 'react';
import {
  Button,
  Header,
  ListBox,
  ListBoxItem,
  ListBoxSection,
  Popover,
  Select,
  SelectValue,
} from 'react-aria-components';
import styles from './choice.module.css';

export interface ChoiceItems {
  /** "" for choices that belong to no group */
  readonly title: string;
  readonly items: readonly { readonly id: string; readonly words: string }[];
}

interface Props {
  /** what is chosen, for a screen reader */
  readonly label: string;
  readonly value: string;
  /** the same array as long as the choices are the same */
  readonly groups: readonly ChoiceItems[];
  readonly onChange: (id: string) => void;
  readonly look?: 'field' | 'title';
}

export const Choice = memo((props: Props): React.JSX.Element => {
  const { label, value, groups, onChange, look = 'field' } = props;
  // The list is built again, item by item, whenever its elements are others: not while a band is dragged.
  const content = useMemo(() => contentOf(groups, label), [groups, label]);
  return (
    <Select
      className={`${styles.choice} ${look === 'title' ? styles.title : styles.field}`}
      aria-label={label}
      value={value}
      onChange={(key) => {
        if (key !== null && String(key) !== value) onChange(String(key));
      }}
    >
      {content}
    </Select>
  );
});

function contentOf(groups: readonly ChoiceItems[], label: string): React.JSX.Element {
  return (
    <>
      <Button className={styles.button ?? ''}>
        <SelectValue className={styles.value ?? ''} />
        <ChevronDown size={12} aria-hidden="true" />
      </Button>
      <Popover className={styles.popover ?? ''}>
        <ListBox className={styles.list ?? ''}>
          {groups.map(({ title, items }) => (
            <ListBoxSection key={title} id={`group ${title}`} aria-label={title || label}>
              {title !== '' && <Header className={styles.group}>{title}</Header>}
              {items.map(({ id, words }) => (
                <ListBoxItem key={id} id={id} className={styles.item ?? ''} textValue={words}>
                  {words}
                </ListBoxItem>
              ))}
            </ListBoxSection>
          ))}
        </ListBox>
      </Popover>
    </>
  );
}
