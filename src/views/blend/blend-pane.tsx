/** The pane beside the lead map: the same area as a false-colour blend of several maps. */
import { useMemo } from 'react';
import { fullChannelsOf } from '../../state/blend-channels';
import { placedBands } from '../../state/placed-bands';
import { useRecipe, useSession } from '../workbench-context';
import { BlendLegend } from './blend-legend';
import styles from './blend-pane.module.css';
import { BlendView } from './blend-view';

export function BlendPane(): React.JSX.Element | null {
  const scan = useSession((session) => session.scan);
  const recipe = useRecipe((document) => document);
  const bands = useMemo(() => (scan === null ? [] : placedBands(recipe, scan)), [recipe, scan]);
  const channels = useMemo(() => fullChannelsOf(recipe.blend), [recipe.blend]);
  if (scan === null) return null;
  return (
    <section className={styles.pane} aria-label="Blend">
      <div className={styles.caption}>
        <b>Blend</b>
        <small>{recipe.blend?.mode ?? ''}</small>
      </div>
      <BlendLegend channels={channels} bands={bands} />
      <BlendView meta={scan.open.plan.meta} />
    </section>
  );
}
