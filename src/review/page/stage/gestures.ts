/** Mouse, pen and fingers on the stage: told as what they mean. */

export interface GestureTarget {
  /** Whether there is something to be dragged at that place, in px of the canvas; `coarse`: under a finger. */
  holds(x: number, y: number, coarse: boolean): boolean;
  grab(x: number, y: number): void;
  drag(x: number, y: number): void;
  drop(): void;
  /** px */
  turn(right: number, down: number): void;
  pan(right: number, down: number): void;
  zoom(factor: number, x: number, y: number): void;
}

type Mode = "idle" | "drag" | "turn" | "pan" | "pinch";

interface Place {
  x: number;
  y: number;
}

/** Of the zoom, for each px that a wheel tells of. */
const WHEEL = 0.0015;

/** Answers what takes the listeners away again. */
export function listen(canvas: HTMLCanvasElement, target: GestureTarget): () => void {
  const pointers = new Map<number, Place>();
  let mode: Mode = "idle";
  const placeOf = (event: MouseEvent): Place => {
    const { left, top } = canvas.getBoundingClientRect();
    return { x: event.clientX - left, y: event.clientY - top };
  };
  const end = () => {
    if (mode === "drag") target.drop();
    mode = "idle";
    canvas.style.cursor = "";
  };

  const down = (event: PointerEvent) => {
    if (event.button > 2 || pointers.size > 1) return;
    const place = placeOf(event);
    canvas.setPointerCapture(event.pointerId);
    pointers.set(event.pointerId, place);
    if (pointers.size > 1) {
      end();
      mode = "pinch";
    } else if (
      event.button === 0 &&
      !event.shiftKey &&
      target.holds(place.x, place.y, event.pointerType === "touch")
    ) {
      mode = "drag";
      canvas.style.cursor = "grabbing";
      target.grab(place.x, place.y);
    } else mode = event.button === 0 && !event.shiftKey ? "turn" : "pan";
  };

  const move = (event: PointerEvent) => {
    const place = placeOf(event);
    const before = pointers.get(event.pointerId);
    if (!before) {
      if (pointers.size === 0) canvas.style.cursor = target.holds(place.x, place.y, false) ? "grab" : "";
      return;
    }
    const [right, lower] = [place.x - before.x, place.y - before.y];
    const other = Array.from(pointers).find(([id]) => id !== event.pointerId)?.[1];
    pointers.set(event.pointerId, place);
    if (mode === "drag") target.drag(place.x, place.y);
    else if (mode === "turn") target.turn(right, lower);
    else if (mode === "pan") target.pan(right, lower);
    else if (mode === "pinch" && other) {
      const factor = distance(place, other) / Math.max(1, distance(before, other));
      target.zoom(factor, (place.x + other.x) / 2, (place.y + other.y) / 2);
      target.pan(right / 2, lower / 2);
    }
  };

  const up = (event: PointerEvent) => {
    if (!pointers.delete(event.pointerId)) return;
    if (mode !== "pinch" || pointers.size === 0) end();
  };

  const wheel = (event: WheelEvent) => {
    event.preventDefault();
    const pixels = event.deltaY * (event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 16 : 1);
    const { x, y } = placeOf(event);
    target.zoom(Math.exp(-pixels * WHEEL), x, y);
  };

  const menu = (event: Event) => event.preventDefault();
  canvas.style.touchAction = "none";
  canvas.addEventListener("pointerdown", down);
  canvas.addEventListener("pointermove", move);
  canvas.addEventListener("pointerup", up);
  canvas.addEventListener("pointercancel", up);
  canvas.addEventListener("wheel", wheel, { passive: false });
  canvas.addEventListener("contextmenu", menu);
  return () => {
    canvas.removeEventListener("pointerdown", down);
    canvas.removeEventListener("pointermove", move);
    canvas.removeEventListener("pointerup", up);
    canvas.removeEventListener("pointercancel", up);
    canvas.removeEventListener("wheel", wheel);
    canvas.removeEventListener("contextmenu", menu);
  };
}

const distance = (a: Place, b: Place): number => Math.hypot(a.x - b.x, a.y - b.y);
