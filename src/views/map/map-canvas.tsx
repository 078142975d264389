/** A map in a pane: its picture, what lies over it, and what pointer and keys do on it. */
import { type ReactNode, type RefObject, useId, useMemo, useRef } from 'react';
import type { ScanMeta } from '../../science/scan';
import type { Pixel } from '../../state/crosshair';
import { fieldOf } from '../canvas/field-of';
import { useRecipe } from '../workbench-context';
import styles from './map.module.css';
import { useMapDrawing } from './use-map-drawing';
import type { Picture } from './use-map-image';
import { useMapInput } from './use-map-input';
import { useSize } from './use-size';

interface Props {
  readonly meta: ScanMeta;
  /** null while there is nothing to show */
  readonly image: Picture | null;
  /** what the map shows, for a screen reader: "Centroid of band tail" */
  readonly label: string;
  /** what is known of a pixel, in words, for a screen reader */
  readonly describePixel: (pixel: Pixel) => string;
  /** hung into the map's upper right corner */
  readonly corner?: ReactNode;
  /** a sentence in place of the picture */
  readonly message?: string | null;
  /** for callers that need the size of the stage */
  readonly stageRef?: RefObject<HTMLDivElement | null>;
}

export function MapCanvas(props: Props): React.JSX.Element {
  const { meta, image, label, describePixel, corner, message = null } = props;
  const ownStage = useRef<HTMLDivElement>(null);
  const host = props.stageRef ?? ownStage;
  const picture = useRef<HTMLCanvasElement>(null);
  const overlay = useRef<HTMLCanvasElement>(null);
  const cornerBox = useRef<HTMLDivElement>(null);
  const spoken = useRef<HTMLSpanElement>(null);
  const keysId = useId();
  const viewport = useSize(host);
  const field = useMemo(() => fieldOf(meta), [meta]);
  const pins = useRecipe((document) => document.pins) ?? noPins;

  const canvases = { picture, overlay, corner: cornerBox };
  useMapDrawing(canvases, { image, meta, field, viewport, pins });
  const input = useMapInput(host, { field, viewport }, (pixel) => {
    if (spoken.current === null) return;
    spoken.current.textContent =
      pixel === null ? '' : `Pixel ${pixel.x}, ${pixel.y}. ${describePixel(pixel)}`;
  });
  return (
    <div
      className={styles.stage}
      ref={host}
      role="application"
      aria-label={label}
      aria-roledescription="map"
      aria-describedby={keysId}
      {...input}
    >
      <canvas className={styles.picture} ref={picture} />
      <canvas className={styles.overlay} ref={overlay} />
      <div className={styles.corner} ref={cornerBox}>
        {corner}
      </div>
      {message !== null && <p className={styles.message}>{message}</p>}
      <span className={styles.spoken} id={keysId}>
        Arrow keys move the crosshair, with Shift by ten pixels; Enter pins a pixel or lets go of
        its pin; plus and minus zoom.
      </span>
      <span className={styles.spoken} ref={spoken} aria-live="polite" />
    </div>
  );
}

const noPins: readonly [] = [];
