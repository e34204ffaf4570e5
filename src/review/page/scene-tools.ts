/** Where the camera stands, and what is drawn beside the prop. */

import type { App } from "./app.js";
import { el } from "./dom.js";
import type { Layer, View } from "./stage.js";

export const VIEWS: readonly { view: View; label: string }[] = [
  { view: "side", label: "Side" },
  { view: "top", label: "Top" },
  { view: "along", label: "Along" },
  { view: "free", label: "Free" },
  { view: "follow", label: "Following" },
];

export const LAYERS: readonly { layer: Layer; label: string; about: string }[] = [
  { layer: "siblings", label: "Other takes", about: "the throw's other takes, pale" },
  { layer: "strobe", label: "Strobe", about: "the prop at even times along its way" },
  { layer: "paths", label: "Paths", about: "of the balance point and of named points" },
  { layer: "arrows", label: "Arrows", about: "angular momentum, spin axis and the prop's own axes" },
  { layer: "surroundings", label: "Surroundings", about: "floor, limits, boxes and marks" },
  { layer: "truth", label: "True flight", about: "as an outline over the played clip" },
];

export function sceneTools({ store, stage }: App): HTMLElement {
  const camera = el(
    "select",
    { onchange: () => store.send({ type: "view", view: camera.value as View }) },
    ...VIEWS.map(({ view, label }) => el("option", { value: view }, `${label} view`)),
  );
  const layers = LAYERS.map(({ layer, label, about }) => {
    const input = el("input", {
      type: "checkbox",
      onchange: () => store.send({ type: "layer", layer, on: input.checked }),
    });
    return {
      layer,
      input,
      label: el("label", { class: "chip", title: about }, input, el("span", {}, label)),
    };
  });
  store.watch(
    ({ view }) => [view],
    (view) => {
      camera.value = view;
    },
  );
  store.watch(
    ({ layers: on }) => [on],
    (on) => {
      for (const { layer, input } of layers) input.checked = on[layer];
    },
  );
  const reset = el(
    "button",
    {
      type: "button",
      "aria-label": "Camera as it was",
      title: "Camera as it was: V",
      onclick: () => stage.resetView(),
    },
    "↺",
  );
  const thinned = el("p", { class: "thinned", role: "status" });
  stage.onThinned = () => {
    thinned.textContent = stage.thinned;
  };
  return el(
    "div",
    { class: "scene-tools" },
    el("label", {}, el("span", { class: "unseen" }, "Camera"), camera),
    reset,
    el("fieldset", {}, el("legend", { class: "unseen" }, "Draw"), ...layers.map(({ label }) => label)),
    thinned,
  );
}
