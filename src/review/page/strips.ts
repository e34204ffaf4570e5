/** Draws strips when they come into sight, a few at a time, so that the stage stays fluent. */

import { motionOf } from "../../bake/take-motion.js";
import { readModel } from "../../gltf/read.js";
import type { MovedNode } from "../../gltf/surfaces.js";
import { conjugate, IDENTITY } from "../../math/quat.js";
import { solidOf } from "../outline.js";
import type { PageProp, PageTake } from "../page-data.js";
import { fill, svg } from "./dom.js";
import type { Files } from "./files.js";
import { type Shown, stripPicture } from "./strip-picture.js";

export interface Strips {
  /** A picture that is drawn once it is seen; the same one for the same take in the same list. */
  strip(take: PageTake, prop: PageProp, list: "throws" | "takes"): SVGSVGElement;
  /** Nothing is drawn before this. */
  start(): void;
  /** The files are other ones. */
  forget(): void;
}

/** ms of drawing between two frames. */
const SLICE = 8;

export function lazyStrips(files: Files): Strips {
  const solids = new Map<string, Promise<Shown | undefined>>();
  const waiting = new Map<Element, () => Promise<void>>();
  const made = {
    throws: new WeakMap<PageTake, SVGSVGElement>(),
    takes: new WeakMap<PageTake, SVGSVGElement>(),
  };
  const queue: Element[] = [];
  let isStarted = false;
  let isRunning = false;

  const observer = new IntersectionObserver(
    (entries) => {
      for (const { target, isIntersecting } of entries) if (isIntersecting) queue.push(target);
      run();
    },
    { rootMargin: "80px" },
  );

  async function run(): Promise<void> {
    if (!isStarted || isRunning) return;
    isRunning = true;
    let started = performance.now();
    for (let next = queue.shift(); next; next = queue.shift()) {
      const draw = waiting.get(next);
      // What has gone from the list meanwhile may come back to it.
      if (!next.isConnected) continue;
      observer.unobserve(next);
      waiting.delete(next);
      await draw?.();
      if (performance.now() - started > SLICE) {
        await new Promise((resolve) => setTimeout(resolve, 0));
        started = performance.now();
      }
    }
    isRunning = false;
  }

  function solid(take: PageTake, prop: PageProp): Promise<Shown | undefined> {
    const found = solids.get(prop.name);
    if (found) return found;
    const read = shownIn(take, prop, files).catch(() => undefined);
    solids.set(prop.name, read);
    return read;
  }

  return {
    strip(take, prop, list) {
      const known = made[list].get(take);
      if (known) return known;
      const picture = svg("svg", { class: "strip", "aria-hidden": "true", focusable: "false" });
      waiting.set(picture, async () => draw(picture, take, prop, await solid(take, prop)));
      made[list].set(take, picture);
      observer.observe(picture);
      return picture;
    },
    start() {
      isStarted = true;
      run();
    },
    forget: () => solids.clear(),
  };
}

/**
 * The prop as the file has it, in metres, without what else its model may hold. A file with one clip rests in that clip's first pose; with several,
 * as modelled.
 */
async function shownIn({ file, clip, motion }: PageTake, prop: PageProp, files: Files): Promise<Shown> {
  const model = await readModel(file, new Uint8Array(await files.get(file)));
  const animations = model.json.animations ?? [];
  const channels = animations.find(({ name }) => name === clip)?.channels ?? [];
  const moved = channels.find(({ target }) => target.path === "translation") ?? channels[0];
  const node = { index: moved?.target.node } as MovedNode;
  if (animations.length > 1)
    return {
      solid: await solidOf(model, { scale: 1, centerOfMass: prop.centerOfMass, node }),
      turned: IDENTITY,
    };
  const { centerOfMass, rotation } = motionOf(motion, prop.axes);
  const solid = await solidOf(model, { scale: 1, centerOfMass: centerOfMass(0), node });
  return { solid, turned: conjugate(rotation(0)) };
}

function draw(picture: SVGSVGElement, take: PageTake, prop: PageProp, shown?: Shown): void {
  const { viewBox, path, poses, larger } = stripPicture(take.motion, prop, shown);
  picture.setAttribute("viewBox", viewBox);
  picture.dataset.larger = String(larger);
  fill(
    picture,
    svg("path", { class: "strip-path", d: path }),
    ...poses.map((d, i) =>
      svg("path", {
        class: i === poses.length - 1 ? "strip-pose strip-end" : "strip-pose",
        d,
        "fill-rule": "evenodd",
      }),
    ),
  );
}
