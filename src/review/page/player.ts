/** Lets the clip's time run while the state says that it plays. */

import { advance, stepFrame } from "./clock.js";
import { type Action, type State, takeOf } from "./state.js";
import type { Store } from "./store.js";

/** A page that was hidden does not jump ahead. */
const LONGEST_STEP = 0.25;

export class Player {
  #time = 0;
  #duration = 0;
  #before: number | undefined;
  readonly #listeners: ((time: number) => void)[] = [];

  constructor(readonly store: Store<State, Action>) {
    store.watch(
      (state) => [takeOf(state)?.motion.duration ?? 0, state.throwName],
      (duration, name) => this.#change(duration, name),
    );
    store.watch(
      (state) => [state.playing],
      (playing) => {
        if (playing) this.#run();
      },
    );
  }

  get time(): number {
    return this.#time;
  }

  get duration(): number {
    return this.#duration;
  }

  /** Calls now and on every change. */
  onTime(listener: (time: number) => void): void {
    this.#listeners.push(listener);
    listener(this.#time);
  }

  seek(time: number): void {
    this.#time = Math.max(0, Math.min(this.#duration, time));
    for (const listener of this.#listeners) listener(this.#time);
  }

  /** Stops and goes to a time, as every hand on the time line does. */
  hold(time: number): void {
    this.store.send({ type: "play", on: false });
    this.seek(time);
  }

  step(frames: number): void {
    this.hold(stepFrame(this.#time, frames, this.store.state.data.frameRate, this.#duration));
  }

  /** From the start where it stands at the end. */
  toggle(): void {
    const { playing } = this.store.state;
    if (!playing && this.#time >= this.#duration) this.seek(0);
    this.store.send({ type: "play", on: !playing });
  }

  #shownThrow: string | undefined;

  /** Another take is looked at in the same moment; who stood at the end stays there; another throw starts anew. */
  #change(duration: number, name: string | undefined): void {
    const atEnd = this.#duration > 0 && this.#time >= this.#duration;
    const isOther = name !== this.#shownThrow;
    this.#shownThrow = name;
    this.#duration = duration;
    this.seek(isOther ? 0 : atEnd ? duration : this.#time);
  }

  #run(): void {
    if (this.#before !== undefined) return;
    const frame = (now: number) => {
      const { playing, slow, loop } = this.store.state;
      if (!playing) {
        this.#before = undefined;
        return;
      }
      const passed = Math.min(LONGEST_STEP, (now - (this.#before ?? now)) / 1000);
      this.#before = now;
      const { time, ended } = advance(this.#time, passed, { slow, loop, duration: this.#duration });
      this.seek(time);
      if (ended) this.store.send({ type: "play", on: false });
      requestAnimationFrame(frame);
    };
    this.#before = performance.now();
    requestAnimationFrame(frame);
  }
}
