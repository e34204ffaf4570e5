/** Draws one candidate's values one by one, and remembers them. */

import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import {
  type Choice,
  type Drawable,
  type DrawableNumber,
  type DrawableVector,
  isSpread,
  type KeyPath,
  type Spread,
} from "../throwfile/types.js";
import { cutNormal } from "./cut-normal.js";
import type { Feature } from "./distance.js";
import { evenDirection, evenOrientation } from "./even-directions.js";
import { type StreamName, stream } from "./stream.js";

export class Draws {
  /** What was drawn, by dotted path: the values as the throw uses them. */
  readonly record: Record<string, unknown> = {};
  /** The same as candidates are compared by; what is taken in turn (`each`) is no draw and not among them. */
  readonly features = new Map<string, Feature>();

  private depth = 0;

  constructor(private readonly name: Omit<StreamName, "path">) {}

  number(path: KeyPath, value: DrawableNumber): number;
  number(path: KeyPath, value: DrawableNumber | undefined): number | undefined;
  number(path: KeyPath, value: DrawableNumber | undefined): number | undefined {
    if (value === undefined) return undefined;
    if (typeof value === "number") return value;
    if ("each" in value) return this.noted(path, value.each[(this.name.take - 1) % value.each.length]);
    const { drawn, quantile } = numberAt(this.stream(path)(), value);
    this.features.set(path.join("."), { kind: "quantile", value: quantile });
    return this.noted(path, drawn);
  }

  vector(path: KeyPath, value: DrawableVector | undefined): Vec3 | undefined {
    return value === undefined ? undefined : this.numbers<Vec3>(path, value);
  }

  /** A vector or quaternion whose components may be spread, or a choice among such. */
  numbers<V extends Vec3 | Quat>(path: KeyPath, value: Drawable<readonly DrawableNumber[]>): V {
    return this.choice(path, value, (item, at) =>
      item.map((component, i) => this.number([...at, i], component)),
    ) as unknown as V;
  }

  word<W extends string>(path: KeyPath, value: Drawable<W>): W {
    return this.choice<W, W>(path, value, (item) => item);
  }

  /**
   * A value, or the one chosen of several; `finish` draws what is spread within it. Draws within a chosen one have streams of their own, so that
   * they do not depend on the others.
   */
  choice<T, D>(path: KeyPath, value: T | Choice<T>, finish: (item: T, path: KeyPath) => D): D {
    if (!isSpread(value)) return finish(value as T, path);
    const choice = value as Choice<T>;
    if ("each" in choice) {
      const index = (this.name.take - 1) % choice.each.length;
      return this.noted(
        path,
        this.within(() => finish(choice.each[index], [...path, "each", index])),
      );
    }
    const index = indexAt(this.stream(path)(), choice.pick.length);
    this.features.set(path.join("."), { kind: "word", value: JSON.stringify(choice.pick[index]) });
    return this.noted(
      path,
      this.within(() => finish(choice.pick[index], [...path, "pick", index])),
    );
  }

  /** Degrees in the full circle. */
  phase(path: KeyPath, matters: boolean): number {
    const turns = this.stream(path)();
    if (!matters) return turns * 360;
    this.features.set(path.join("."), { kind: "phase", value: turns });
    return this.noted(path, turns * 360);
  }

  /** Even from 0 to 1, for a choice made later. */
  share(path: KeyPath): number {
    const value = this.stream(path)();
    this.features.set(path.join("."), { kind: "quantile", value });
    return this.noted(path, value);
  }

  direction(path: KeyPath): Vec3 {
    const value = evenDirection(this.stream(path));
    this.features.set(path.join("."), { kind: "direction", value });
    return this.noted(path, value);
  }

  orientation(path: KeyPath): Quat {
    const value = evenOrientation(this.stream(path));
    this.features.set(path.join("."), { kind: "orientation", value });
    return this.noted(path, value);
  }

  private stream(path: KeyPath): () => number {
    return stream({ ...this.name, path });
  }

  private noted<T>(path: KeyPath, value: T): T {
    if (this.depth === 0 && value !== undefined) this.record[path.join(".")] = value;
    return value;
  }

  /** What is drawn within a chosen value is part of that value's entry in the record. */
  private within<T>(finish: () => T): T {
    this.depth++;
    const value = finish();
    this.depth--;
    return value;
  }
}

const indexAt = (quantile: number, count: number): number => Math.floor(quantile * count);

/** The number at a quantile of its spread, and the quantile it stands for: of one of several, the middle of its part. */
function numberAt(
  u: number,
  spread: Exclude<Spread<number>, { each: unknown }>,
): { drawn: number; quantile: number } {
  if ("normal" in spread) return { drawn: spread.normal[0] + spread.normal[1] * cutNormal(u), quantile: u };
  if ("pick" in spread) {
    const drawn = spread.pick[indexAt(u, spread.pick.length)];
    const below = spread.pick.filter((value) => value < drawn).length;
    const equal = spread.pick.filter((value) => value === drawn).length;
    return { drawn, quantile: (below + equal / 2) / spread.pick.length };
  }
  const [least, greatest] = spread.range;
  if (spread.frames === undefined)
    return { drawn: Math.min(greatest, least + u * (greatest - least)), quantile: u };
  // The ends are whole frames written in seconds.
  const first = Math.round(least * spread.frames);
  const count = Math.round(greatest * spread.frames) - first + 1;
  const index = indexAt(u, count);
  return { drawn: (first + index) / spread.frames, quantile: (index + 0.5) / count };
}
