import { type RefObject, useEffect } from 'react';
import type { View } from './types.ts';
import { panBy, pinch, timeAtShare, zoomAt } from './view.ts';
import type { Tool, ViewModel } from './view-model.ts';

/** Where a pointer went down and came up again: on one place, or from one time to another. `y` from the top of the stack. */
export interface Placed {
  readonly from: number;
  readonly to: number;
  readonly y: number;
  readonly dragged: boolean;
}

/** What the pointers on the lanes are doing. */
type Gesture =
  | { readonly kind: 'idle' }
  | { readonly kind: 'pan'; readonly startX: number; readonly view: View; readonly moved: boolean }
  | { readonly kind: 'pinch'; readonly times: readonly [number, number] }
  | {
      readonly kind: 'drawing';
      readonly tool: Exclude<Tool, 'move'>;
      readonly fromS: number;
      readonly moved: boolean;
    };

/** A press that moves less than this is a tap. */
const TAP_PX = 6;
const DOUBLE_TAP_MS = 320;

/** Wheel zooms at the pointer, drag moves, two fingers pinch, a double tap shows all; the span and mark tools draw. */
export function useLaneGestures(
  stage: RefObject<HTMLElement | null>,
  model: ViewModel,
  onPlace: (placed: Placed) => void,
): void {
  useEffect(() => {
    const element = stage.current;
    if (element === null) return;
    let gesture: Gesture = { kind: 'idle' };
    let lastTap = { at: 0, x: 0 };
    const pointers = new Map<number, number>();
    const share = (clientX: number) => {
      const box = element.getBoundingClientRect();
      return (clientX - box.left) / Math.max(box.width, 1);
    };
    const timeOf = (clientX: number) => timeAtShare(model.view.get(), share(clientX));
    const yOfEvent = (event: PointerEvent) => event.clientY - element.getBoundingClientRect().top;
    const secondsPerPx = (view: View) => (view.to - view.from) / Math.max(element.clientWidth, 1);

    const beginPinch = () => {
      const [a, b] = [...pointers.values()].sort((one, two) => one - two);
      if (a !== undefined && b !== undefined) gesture = { kind: 'pinch', times: [timeOf(a), timeOf(b)] };
    };
    const down = (event: PointerEvent) => {
      if (event.button !== 0 || (event.target as HTMLElement).closest('button, [role=slider]') !== null)
        return;
      element.setPointerCapture(event.pointerId);
      pointers.set(event.pointerId, event.clientX);
      if (pointers.size === 2) return beginPinch();
      const tool = model.tool.get();
      gesture =
        tool === 'move'
          ? { kind: 'pan', startX: event.clientX, view: model.view.get(), moved: false }
          : { kind: 'drawing', tool, fromS: timeOf(event.clientX), moved: false };
    };
    const move = (event: PointerEvent) => {
      if (event.pointerType === 'mouse') model.cursorS.set(timeOf(event.clientX));
      if (!pointers.has(event.pointerId)) return;
      pointers.set(event.pointerId, event.clientX);
      if (gesture.kind === 'pinch') {
        const [a, b] = [...pointers.values()].sort((one, two) => one - two);
        if (a !== undefined && b !== undefined)
          model.show(pinch(gesture.times, [share(a), share(b)], model.bounds));
      } else if (gesture.kind === 'pan') {
        const { startX, view } = gesture;
        const moved = gesture.moved || Math.abs(event.clientX - startX) > TAP_PX;
        gesture = { ...gesture, moved };
        if (moved) model.show(panBy(view, (startX - event.clientX) * secondsPerPx(view), model.bounds));
      } else if (gesture.kind === 'drawing') {
        const toS = timeOf(event.clientX);
        const moved =
          gesture.moved || Math.abs(toS - gesture.fromS) > TAP_PX * secondsPerPx(model.view.get());
        gesture = { ...gesture, moved };
        if (moved) model.span.set({ from: Math.min(gesture.fromS, toS), to: Math.max(gesture.fromS, toS) });
      }
    };
    const up = (event: PointerEvent) => {
      if (!pointers.delete(event.pointerId)) return;
      const ended = gesture;
      gesture = { kind: 'idle' };
      if (event.type === 'pointercancel') return;
      const at = timeOf(event.clientX);
      if (ended.kind === 'drawing') {
        const [from, to] = ended.moved ? [Math.min(ended.fromS, at), Math.max(ended.fromS, at)] : [at, at];
        if (ended.tool === 'mark') {
          model.span.set(null);
          onPlace({ from, to, y: yOfEvent(event), dragged: ended.moved });
        }
        if (ended.moved || ended.tool === 'mark') model.tool.set('move');
      } else if (ended.kind === 'pan' && !ended.moved) {
        const double =
          event.timeStamp - lastTap.at < DOUBLE_TAP_MS && Math.abs(event.clientX - lastTap.x) < 24;
        lastTap = double ? { at: 0, x: 0 } : { at: event.timeStamp, x: event.clientX };
        if (double) model.show(model.bounds.whole);
        else model.cursorS.set(at);
      } else if (ended.kind === 'pinch' && pointers.size === 1) {
        const [x] = pointers.values();
        gesture = { kind: 'pan', startX: x ?? 0, view: model.view.get(), moved: true };
      }
    };
    const leave = (event: PointerEvent) => {
      if (event.pointerType === 'mouse' && pointers.size === 0) model.cursorS.set(null);
    };
    const wheel = (event: WheelEvent) => {
      event.preventDefault();
      const unit = event.deltaMode === 1 ? 16 : event.deltaMode === 2 ? 400 : 1;
      if (Math.abs(event.deltaX) > Math.abs(event.deltaY)) {
        const view = model.view.get();
        model.show(panBy(view, event.deltaX * unit * secondsPerPx(view), model.bounds));
      } else {
        const factor = Math.exp(Math.min(Math.max(event.deltaY * unit, -300), 300) * 0.0022);
        model.show(zoomAt(model.view.get(), timeOf(event.clientX), factor, model.bounds));
      }
    };
    element.addEventListener('pointerdown', down);
    element.addEventListener('pointermove', move);
    element.addEventListener('pointerup', up);
    element.addEventListener('pointercancel', up);
    element.addEventListener('pointerleave', leave);
    element.addEventListener('wheel', wheel, { passive: false });
    return () => {
      element.removeEventListener('pointerdown', down);
      element.removeEventListener('pointermove', move);
      element.removeEventListener('pointerup', up);
      element.removeEventListener('pointercancel', up);
      element.removeEventListener('pointerleave', leave);
      element.removeEventListener('wheel', wheel);
    };
  }, [stage, model, onPlace]);
}
