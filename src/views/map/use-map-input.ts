/** Joins pointer, wheel and keys of a map's element to what they do. */
import {
  type KeyboardEvent,
  type PointerEvent,
  type RefObject,
  useEffect,
  useMemo,
  useRef,
} from 'react';
import type { Pixel } from '../../state/crosshair';
import type { CanvasPoint } from '../canvas/camera';
import { sharedCamera } from '../canvas/shared-camera';
import { useWorkbench } from '../workbench-context';
import { type Ground, MapHand } from './map-hand';
import { pressMapKey } from './map-keys';

interface MapInput {
  /** keys work on a map that has the focus */
  readonly tabIndex: 0;
  readonly onPointerDown: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerMove: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerUp: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerCancel: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerLeave: (event: PointerEvent<HTMLElement>) => void;
  readonly onKeyDown: (event: KeyboardEvent<HTMLElement>) => void;
  readonly onBlur: () => void;
}

const wheelLinePx = 16;
const zoomPerWheelPx = 0.0015;

/** @param speak - tells a screen reader of the pixel keys went to */
export function useMapInput(
  host: RefObject<HTMLElement | null>,
  ground: Ground,
  speak: (pixel: Pixel | null) => void,
): MapInput {
  const workbench = useWorkbench();
  const current = useRef(ground);
  current.current = ground;
  const hand = useMemo(() => new MapHand(workbench, () => current.current), [workbench]);
  const isOver = useRef(false);
  const isSpaceHeld = useSpaceHeld(host, isOver);

  useEffect(() => {
    const element = host.current;
    if (element === null) return;
    // React's wheel listener is passive; zooming must keep the page from scrolling.
    const zoom = (event: WheelEvent): void => {
      event.preventDefault();
      const deltaPx =
        event.deltaY * (event.deltaMode === WheelEvent.DOM_DELTA_LINE ? wheelLinePx : 1);
      // A pinch on a touch pad comes as small wheel steps with the control key.
      const factor = Math.exp(-deltaPx * zoomPerWheelPx * (event.ctrlKey ? 6 : 1));
      const { field, viewport } = current.current;
      sharedCamera.zoomAbout(factor, pointIn(element, event), field, viewport);
      workbench.crosshair.set(hand.pixelAt(pointIn(element, event)));
    };
    element.addEventListener('wheel', zoom, { passive: false });
    return () => element.removeEventListener('wheel', zoom);
  }, [host, hand, workbench]);

  const showHold = (element: HTMLElement, at: CanvasPoint): void => {
    const isPan = hand.isPanning || isSpaceHeld.current;
    element.dataset.hold = isPan ? 'pan' : hand.pinNear(at) === null ? 'look' : 'pin';
  };
  return {
    tabIndex: 0,
    onPointerDown(event) {
      if (event.button > 1) return;
      const isPan = event.button === 1 || event.shiftKey || isSpaceHeld.current;
      // Else the middle button scrolls.
      if (event.button === 1) event.preventDefault();
      event.currentTarget.setPointerCapture(event.pointerId);
      hand.press(event.pointerId, pointIn(event.currentTarget, event), isPan);
    },
    onPointerMove(event) {
      isOver.current = true;
      const at = pointIn(event.currentTarget, event);
      hand.move(event.pointerId, at);
      showHold(event.currentTarget, at);
    },
    onPointerUp(event) {
      hand.lift(event.pointerId, pointIn(event.currentTarget, event));
    },
    onPointerCancel(event) {
      hand.cancel(event.pointerId);
    },
    onPointerLeave(event) {
      isOver.current = false;
      // A lifted finger has left as well; what it touched stays marked.
      if (event.pointerType !== 'touch' && !hand.isBusy) workbench.crosshair.set(null);
    },
    onKeyDown(event) {
      if (!pressMapKey(workbench, current.current, event)) return;
      event.preventDefault();
      event.stopPropagation();
      speak(workbench.crosshair.get());
    },
    onBlur() {
      if (!isOver.current) workbench.crosshair.set(null);
    },
  };
}

/** Whether space is held while the pointer is over the map or the map has the focus. */
function useSpaceHeld(
  host: RefObject<HTMLElement | null>,
  isOver: RefObject<boolean>,
): RefObject<boolean> {
  const isHeld = useRef(false);
  useEffect(() => {
    const change = (event: globalThis.KeyboardEvent): void => {
      if (event.code !== 'Space') return;
      const isHere = event.target === host.current || event.target === document.body;
      if (event.type === 'keydown' && !(isOver.current && isHere)) return;
      isHeld.current = event.type === 'keydown';
      if (isHeld.current) event.preventDefault();
    };
    const release = (): void => {
      isHeld.current = false;
    };
    window.addEventListener('keydown', change);
    window.addEventListener('keyup', change);
    window.addEventListener('blur', release);
    return () => {
      window.removeEventListener('keydown', change);
      window.removeEventListener('keyup', change);
      window.removeEventListener('blur', release);
    };
  }, [host, isOver]);
  return isHeld;
}

function pointIn(
  element: HTMLElement,
  { clientX, clientY }: { readonly clientX: number; readonly clientY: number },
): CanvasPoint {
  const { left, top } = element.getBoundingClientRect();
  return { xPx: clientX - left, yPx: clientY - top };
}
