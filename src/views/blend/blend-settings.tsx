/** Settings of the blend: how its channels are mixed, and each of them. */
import { Plus } from 'lucide-react';
import { useMemo } from 'react';
import { Button, Label, Radio, RadioGroup } from 'react-aria-components';
import { addChannel, canAddChannel, setMixing } from '../../state/blend-actions';
import { fullChannelsOf } from '../../state/blend-channels';
import { useMapChoices } from '../forms/use-map-choices';
import { useRecipe, useWorkbench } from '../workbench-context';
import styles from './blend-settings.module.css';
import { ChannelSettings } from './channel-settings';

export function BlendSettings(): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const channels = useMemo(() => fullChannelsOf(recipe.blend), [recipe.blend]);
  const { items } = useMapChoices();
  const entries = channels.map((channel, index) => ({ channel, index, key: `channel ${index}` }));
  return (
    <section className={styles.section} aria-label="Settings of the blend">
      <h2 className={styles.heading}>Blend channels</h2>
      {recipe.blend !== undefined && (
        <RadioGroup
          className={styles.mixing ?? ''}
          value={recipe.blend.mode}
          onChange={(mode) => setMixing(workbench, mode === 'screen' ? 'screen' : 'additive')}
        >
          <Label>mixing</Label>
          <Radio value="additive" className={styles.radio ?? ''}>
            additive
          </Radio>
          <Radio value="screen" className={styles.radio ?? ''}>
            screen
          </Radio>
        </RadioGroup>
      )}
      <ol className={styles.channels}>
        {entries.map(({ channel, index, key }) => (
          <ChannelSettings key={key} channel={channel} index={index} choices={items} />
        ))}
      </ol>
      {canAddChannel(recipe) && (
        <Button className={styles.add ?? ''} onPress={() => addChannel(workbench)}>
          <Plus size={13} aria-hidden="true" /> Add channel
        </Button>
      )}
    </section>
  );
}
