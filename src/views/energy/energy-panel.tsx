/** The spine of the screen: the energy axis with its spectra, bands on it, and the maps that hang from them. */
import { scaleLinear } from 'd3-scale';
import { useEffect, useMemo, useRef } from 'react';
import { useSize } from '../map/use-size';
import { PeakHandles } from '../model/peak-handles';
import { useSession, useView, useWorkbench } from '../workbench-context';
import { BandOverlay } from './band-overlay';
import styles from './energy-panel.module.css';
import { HungMaps } from './hung-maps';
import { panelLayout } from './panel-layout';
import { SpectrumView } from './spectrum-view';

export function EnergyPanel(): React.JSX.Element {
  const { view } = useWorkbench();
  const host = useRef<HTMLElement>(null);
  const { widthPx, heightPx } = useSize(host);
  const scan = useSession((session) => session.scan);
  const shown = useView((state) => state.energyRange);

  const axis = scan?.open.plan.meta.axis ?? null;
  const whole = useMemo((): readonly [number, number] => {
    if (axis === null) return [1, 2];
    return [axis.edgesEv[0] ?? 1, axis.edgesEv[axis.edgesEv.length - 1] ?? 2];
  }, [axis]);
  const [fromEv, toEv] = shown ?? whole;
  const evToX = useMemo(
    () =>
      scaleLinear(
        [fromEv, toEv],
        [panelLayout.leftPx, Math.max(widthPx - panelLayout.rightPx, panelLayout.leftPx + 1)],
      ),
    [fromEv, toEv, widthPx],
  );

  useEffect(() => {
    const element = host.current;
    if (element === null) return;
    // React's wheel listener is passive; zooming must keep the page from scrolling.
    const zoom = (event: WheelEvent): void => {
      event.preventDefault();
      const left = element.getBoundingClientRect().left;
      const centre = evToX.invert(event.clientX - left);
      const factor = event.deltaY > 0 ? 1.2 : 1 / 1.2;
      const low = Math.max(whole[0], centre - (centre - fromEv) * factor);
      const high = Math.min(whole[1], centre + (toEv - centre) * factor);
      const isWhole = low <= whole[0] && high >= whole[1];
      if (high - low > (whole[1] - whole[0]) / 400)
        view.setState({ energyRange: isWhole ? null : [low, high] });
    };
    element.addEventListener('wheel', zoom, { passive: false });
    return () => element.removeEventListener('wheel', zoom);
  }, [evToX, fromEv, toEv, whole, view]);

  const isReady = scan !== null && widthPx > 0 && heightPx > 0;
  return (
    <section className={styles.panel} ref={host} aria-label="Spectrum and bands">
      {isReady && (
        <>
          <SpectrumView evToX={evToX} widthPx={widthPx} heightPx={heightPx} />
          <BandOverlay evToX={evToX} widthPx={widthPx} heightPx={heightPx} />
          <PeakHandles
            evToX={evToX}
            widthPx={widthPx}
            heightPx={heightPx}
            box={{
              left: panelLayout.leftPx,
              right: widthPx - panelLayout.rightPx,
              top: panelLayout.plotTopPx,
              height: heightPx - panelLayout.bottomPx - panelLayout.plotTopPx,
            }}
          />
          <HungMaps evToX={evToX} widthPx={widthPx} />
        </>
      )}
    </section>
  );
}
