/** How far the played clip is from the true flight, over the clip's time. */

import type { App } from "./app.js";
import { el, fill, svg } from "./dom.js";
import { takeOf } from "./state.js";
import { decimals, digits } from "./words.js";

const SAMPLES = 400;
/** Of the picture, in its own unit. */
const WIDTH = 320;
const HEIGHT = 96;
const LEFT = 34;
const BOTTOM = 18;
const TOP = 12;

export function differencePlot({ store, stage, player }: App): { element: HTMLElement; draw(): void } {
  const picture = svg("svg", { viewBox: `0 0 ${WIDTH} ${HEIGHT}`, class: "plot", role: "img" });
  const words = el("p", { class: "plot-words" });
  const cursor = svg("line", { class: "cursor", y1: TOP, y2: HEIGHT - BOTTOM });
  let duration = 0;

  const right = (time: number) => LEFT + (duration > 0 ? time / duration : 0) * (WIDTH - LEFT - 6);

  function draw(): void {
    const take = takeOf(store.state);
    const { times, millimetres } = stage.differences(SAMPLES);
    duration = take?.motion.duration ?? 0;
    if (!take || times.length === 0) {
      fill(picture);
      words.textContent = "";
      return;
    }
    const allowed = take.record.tolerance * 1000;
    const most = Math.max(...millimetres);
    const scale = Math.max(most, allowed) * 1.1;
    const up = (value: number) => HEIGHT - BOTTOM - (value / scale) * (HEIGHT - BOTTOM - TOP);
    const sentence = `At most ${digits(most)} mm from the true flight; ${digits(allowed)} mm are allowed.`;
    picture.setAttribute("aria-label", `Difference over time. ${sentence}`);
    words.textContent = sentence;
    const points = times.map((time, i) => `${decimals(right(time), 2)} ${decimals(up(millimetres[i]), 2)}`);
    fill(
      picture,
      svg("path", { class: "axis", d: `M${LEFT} ${TOP}V${HEIGHT - BOTTOM}H${WIDTH - 6}` }),
      svg("line", { class: "allowed", x1: LEFT, x2: WIDTH - 6, y1: up(allowed), y2: up(allowed) }),
      svg("path", { class: "course", d: `M${points.join("L")}` }),
      svg("text", { x: LEFT - 4, y: up(allowed) + 4, "text-anchor": "end" }, digits(allowed)),
      svg("text", { x: LEFT - 4, y: HEIGHT - BOTTOM + 4, "text-anchor": "end" }, "0"),
      svg("text", { x: LEFT - 4, y: TOP - 2, "text-anchor": "end" }, "mm"),
      svg("text", { x: LEFT, y: HEIGHT - 4 }, "0 s"),
      svg("text", { x: WIDTH - 6, y: HEIGHT - 4, "text-anchor": "end" }, `${decimals(duration, 2)} s`),
      cursor,
    );
    move(player.time);
  }

  function move(time: number): void {
    const x = decimals(right(time), 2);
    cursor.setAttribute("x1", x);
    cursor.setAttribute("x2", x);
  }

  player.onTime(move);
  return {
    element: el("div", { class: "difference" }, el("h3", {}, "Clip against true flight"), words, picture),
    draw,
  };
}
