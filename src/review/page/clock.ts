/** How the time of a clip goes on. */

export interface Pace {
  /** One second of the clip takes this many. */
  slow: number;
  loop: boolean;
  duration: number;
}

/** @param passed s of the clock on the wall */
export function advance(
  time: number,
  passed: number,
  { slow, loop, duration }: Pace,
): { time: number; ended: boolean } {
  const next = time + passed / slow;
  if (next < duration) return { time: next, ended: false };
  if (!loop || duration === 0) return { time: duration, ended: true };
  return { time: next % duration, ended: false };
}

/** Times this close, in frames, are the same frame. */
const SAME_FRAME = 1e-4;

/** The next whole frame, or the clip's own ends, which need be none. */
export function stepFrame(time: number, frames: number, frameRate: number, duration: number): number {
  const at = time * frameRate;
  const near = Math.round(at);
  const base = Math.abs(at - near) < SAME_FRAME ? near : frames > 0 ? Math.floor(at) : Math.ceil(at);
  return Math.max(0, Math.min(duration, (base + frames) / frameRate));
}
