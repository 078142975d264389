/**
 * What a pointer does on a map, apart from React: hover moves the crosshair, a click pins or lets go,
 * a pin is dragged, middle button, shift or space pan, two fingers pan and zoom.
 */
import type { Pixel } from '../../state/crosshair';
import { addPinAt, movePinTo, removePin } from '../../state/pin-actions';
import type { Workbench } from '../../state/workbench';
import {
  type CanvasPoint,
  type Field,
  middleOf,
  pixelAt,
  place,
  type Viewport,
} from '../canvas/camera';
import { sharedCamera } from '../canvas/shared-camera';
import { pinRadiusPx } from './draw-overlay';

/** The map as it lies under the hand. */
export interface Ground {
  readonly field: Field;
  readonly viewport: Viewport;
}

/** A pointer that went no further is a click, px. */
const clickPx = 3;
/** How near a pin is touched, px: half its ring more. */
const touchPx = pinRadiusPx + 3;

type Doing =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'press'; readonly from: CanvasPoint; readonly pin: string | null }
  | { readonly kind: 'drag-pin'; readonly pin: string }
  | { readonly kind: 'pan' }
  | { readonly kind: 'pinch' }
  /** moved too far for a click: it only shows what is under it */
  | { readonly kind: 'look' };

const nothing: Doing = { kind: 'nothing' };

export class MapHand {
  private doing: Doing = nothing;
  /** pointers that are down, by id */
  private readonly down = new Map<number, CanvasPoint>();

  constructor(
    private readonly workbench: Workbench,
    readonly ground: () => Ground,
  ) {}

  /** @param isPan - middle button, shift or space */
  press(id: number, at: CanvasPoint, isPan: boolean): void {
    this.down.set(id, at);
    if (this.down.size > 1) {
      this.finishDrag();
      this.doing = { kind: 'pinch' };
    } else if (isPan) {
      this.doing = { kind: 'pan' };
    } else {
      this.doing = { kind: 'press', from: at, pin: this.pinNear(at) };
    }
  }

  move(id: number, at: CanvasPoint): void {
    const before = this.down.get(id);
    if (before !== undefined) this.drag(id, before, at);
    this.workbench.crosshair.set(this.pixelAt(at));
  }

  lift(id: number, at: CanvasPoint): void {
    if (!this.down.delete(id)) return;
    const { doing } = this;
    this.finishDrag();
    if (doing.kind !== 'press') return;
    const pixel = this.pixelAt(at);
    if (doing.pin !== null) removePin(this.workbench, doing.pin);
    else if (pixel !== null) addPinAt(this.workbench, pixel);
  }

  /** The system took the pointer away: nothing is done. */
  cancel(id: number): void {
    this.down.delete(id);
    this.finishDrag();
  }

  get isBusy(): boolean {
    return this.doing.kind !== 'nothing';
  }

  get isPanning(): boolean {
    return this.doing.kind === 'pan';
  }

  /** The name of the pin under a point; null where there is none. */
  pinNear(at: CanvasPoint): string | null {
    const { field, viewport } = this.ground();
    const placement = place(sharedCamera.getState(), field, viewport);
    let nearest: string | null = null;
    let least = touchPx;
    for (const pin of this.workbench.recipe.getState().recipe.pins ?? []) {
      if (pin.x >= field.nx || pin.y >= field.ny) continue;
      const distance = distanceOf(middleOf(pin, placement), at);
      if (distance > least) continue;
      nearest = pin.name;
      least = distance;
    }
    return nearest;
  }

  pixelAt(at: CanvasPoint): Pixel | null {
    const { field, viewport } = this.ground();
    return pixelAt(at, place(sharedCamera.getState(), field, viewport), field);
  }

  private drag(id: number, before: CanvasPoint, at: CanvasPoint): void {
    const { field, viewport } = this.ground();
    const { doing } = this;
    if (doing.kind === 'pinch') {
      this.pinch(id, before, at);
    } else if (doing.kind === 'pan') {
      sharedCamera.panBy({ xPx: at.xPx - before.xPx, yPx: at.yPx - before.yPx }, field, viewport);
    } else if (doing.kind === 'press' && distanceOf(doing.from, at) > clickPx) {
      this.doing = doing.pin === null ? { kind: 'look' } : { kind: 'drag-pin', pin: doing.pin };
    }
    this.down.set(id, at);
    const pixel = this.pixelAt(at);
    if (this.doing.kind === 'drag-pin' && pixel !== null) {
      movePinTo(this.workbench, this.doing.pin, pixel);
    }
  }

  /** One finger of two moved: the map follows the middle between them and their distance. */
  private pinch(id: number, before: CanvasPoint, at: CanvasPoint): void {
    const other = [...this.down].find(([otherId]) => otherId !== id)?.[1];
    if (other === undefined) return;
    const { field, viewport } = this.ground();
    const by = { xPx: (at.xPx - before.xPx) / 2, yPx: (at.yPx - before.yPx) / 2 };
    sharedCamera.panBy(by, field, viewport);
    const factor = distanceOf(at, other) / Math.max(distanceOf(before, other), 1);
    const middle = { xPx: (at.xPx + other.xPx) / 2, yPx: (at.yPx + other.yPx) / 2 };
    sharedCamera.zoomAbout(factor, middle, field, viewport);
  }

  private finishDrag(): void {
    if (this.doing.kind === 'drag-pin') this.workbench.recipe.endGesture();
    // The second finger lifted must not turn into a click.
    this.doing = this.down.size > 0 ? { kind: 'look' } : nothing;
  }
}

function distanceOf(one: CanvasPoint, other: CanvasPoint): number {
  return Math.hypot(one.xPx - other.xPx, one.yPx - other.yPx);
}
