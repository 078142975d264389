/** A small still picture of a map, its proportions kept. */
import { useEffect, useMemo, useRef } from 'react';
import { fitted, place } from '../canvas/camera';
import { fieldOf } from '../canvas/field-of';
import { fitCanvas } from '../energy/line-canvas';
import { readTokens } from '../read-tokens';
import { useSession, useView } from '../workbench-context';
import { drawPicture } from './draw-picture';
import styles from './map.module.css';
import type { Picture } from './use-map-image';

interface Props {
  /** null while there is nothing to show: a neutral ground */
  readonly image: Picture | null;
  readonly widthPx: number;
  readonly heightPx: number;
  /** height of a pixel over its width; left out: that of the scan on screen */
  readonly aspect?: number;
}

export function MapThumbnail({ image, widthPx, heightPx, ...given }: Props): React.JSX.Element {
  const canvas = useRef<HTMLCanvasElement>(null);
  const meta = useSession((session) => session.scan?.open.plan.meta ?? null);
  const theme = useView((view) => view.theme);
  const placement = useMemo(() => {
    if (image === null) return null;
    const aspect = given.aspect ?? (meta === null ? 1 : fieldOf(meta).aspect);
    return place(fitted, { nx: image.nx, ny: image.ny, aspect }, { widthPx, heightPx });
  }, [image, meta, given.aspect, widthPx, heightPx]);

  useEffect(() => {
    const element = canvas.current;
    if (element === null) return;
    fitCanvas(element, widthPx, heightPx);
    const tokens = readTokens(theme);
    const none = { leftPx: 0, topPx: 0, columnPx: 1, rowPx: 1 };
    drawPicture(element, image, placement ?? none, { ground: tokens.plot, strokes: tokens.grid });
  }, [image, placement, widthPx, heightPx, theme]);

  return (
    <canvas
      className={image === null ? `${styles.thumbnail} ${styles.blank}` : styles.thumbnail}
      ref={canvas}
      style={{ width: widthPx, height: heightPx }}
    />
  );
}
