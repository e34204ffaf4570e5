/** What the page shows, and what changes it. */

import type { PageData, PageProp, PageTake, PageThrow } from "../page-data.js";
import { type Measured, type MeasureKey, measure, measureOf } from "./measures.js";
import { inOrder, type Order, PLAIN_ORDER } from "./order.js";
import type { Layer, View } from "./stage.js";
import { clear, decide, type Verdict, type Verdicts, verdictOf } from "./verdicts.js";

export const SLOWNESS = [1, 2, 4, 8] as const;
export type Slowness = (typeof SLOWNESS)[number];

export interface State {
  data: PageData;
  /** Name of the throw or chain that is looked at; none while there is none. */
  throwName?: string;
  /** Number of the take that is looked at, and of the one beside it. */
  take?: number;
  beside?: number;
  playing: boolean;
  loop: boolean;
  slow: Slowness;
  view: View;
  layers: Readonly<Record<Layer, boolean>>;
  order: Order;
  verdicts: Verdicts;
  /** Single letters are keys too. */
  letters: boolean;
  connected: boolean;
  /** What the page itself could not do, in words. */
  trouble?: string;
}

export type Action =
  | { type: "data"; data: PageData }
  | { type: "throw"; name: string }
  | { type: "take"; take: number }
  | { type: "beside"; take?: number }
  | { type: "play"; on: boolean }
  | { type: "loop"; on: boolean }
  | { type: "slow"; by: Slowness }
  | { type: "view"; view: View }
  | { type: "layer"; layer: Layer; on: boolean }
  | { type: "order"; by: MeasureKey }
  | { type: "sift"; change: Partial<Omit<Order, "by">> }
  | { type: "verdict"; verdict: Verdict }
  | { type: "clear" }
  | { type: "letters"; on: boolean }
  | { type: "connected"; on: boolean }
  | { type: "trouble"; text?: string };

export const firstState = (
  data: PageData,
  { playing, verdicts }: Pick<State, "playing" | "verdicts">,
): State =>
  settled({
    data,
    playing,
    loop: true,
    slow: 1,
    view: "side",
    layers: { siblings: true, strobe: true, paths: true, arrows: false, surroundings: true, truth: false },
    order: PLAIN_ORDER,
    verdicts,
    letters: true,
    connected: true,
  });

export function reduce(state: State, action: Action): State {
  switch (action.type) {
    case "data":
      return settled({ ...state, data: keepingKnown(state.data, action.data) });
    case "throw":
      return action.name === state.throwName
        ? state
        : settled({
            ...state,
            throwName: action.name,
            take: undefined,
            beside: undefined,
            order: { ...state.order, least: undefined, most: undefined },
          });
    case "take":
      return settled({ ...state, take: action.take });
    case "beside":
      return settled({ ...state, beside: action.take });
    case "play":
      return { ...state, playing: action.on };
    case "loop":
      return { ...state, loop: action.on };
    case "slow":
      return { ...state, slow: action.by };
    case "view":
      return { ...state, view: action.view };
    case "layer":
      return { ...state, layers: { ...state.layers, [action.layer]: action.on } };
    case "order": {
      const { highFirst } = measureOf(action.by);
      return { ...state, order: { by: action.by, highFirst, keep: state.order.keep } };
    }
    case "sift":
      return { ...state, order: { ...state.order, ...action.change } };
    case "verdict": {
      const take = takeOf(state);
      return take
        ? followed(state, { ...state, verdicts: decide(state.verdicts, take.motion, action.verdict) })
        : state;
    }
    case "clear":
      return state.throwName === undefined
        ? state
        : { ...state, verdicts: clear(state.verdicts, state.throwName) };
    case "letters":
      return { ...state, letters: action.on };
    case "connected":
      return { ...state, connected: action.on };
    case "trouble":
      return { ...state, trouble: action.text };
  }
}

/** A throw that was baked of the same as before stays the same object, and a prop that is the same, so that nothing of them is drawn anew. */
function keepingKnown(before: PageData, after: PageData): PageData {
  const known = new Map(before.throws.map((shown) => [shown.name, shown]));
  const throws = after.throws.map((shown) => {
    const old = known.get(shown.name);
    return old &&
      shown.stamp !== undefined &&
      old.stamp === shown.stamp &&
      old.takes.length === shown.takes.length
      ? old
      : shown;
  });
  const props = Object.entries(after.props).map(([name, prop]) => {
    const old = Object.hasOwn(before.props, name) ? before.props[name] : undefined;
    return [name, JSON.stringify(old) === JSON.stringify(prop) ? old : prop];
  });
  return { ...after, throws, props: Object.fromEntries(props) };
}

/** Where only undecided takes are listed, the next one moves up to the place of the one that was decided. */
function followed(before: State, after: State): State {
  const at = listed(before).findIndex(({ number }) => number === before.take);
  const list = listed(after);
  if (at < 0 || list.length === 0 || list.some(({ number }) => number === before.take)) return after;
  return { ...after, take: list[Math.min(at, list.length - 1)].number };
}

/** Throw and takes that there are: what was looked at, or else the first. */
function settled(state: State): State {
  const { throws } = state.data;
  const shown =
    throws.find(({ name }) => name === state.throwName) ??
    throws.find(({ takes }) => takes.length > 0) ??
    throws[0];
  const chosen: State = { ...state, throwName: shown?.name };
  const has = (take?: number) => shown?.takes.some(({ motion }) => motion.take === take);
  const take = has(state.take) ? state.take : (listed(chosen)[0]?.number ?? shown?.takes[0]?.motion.take);
  return { ...chosen, take, beside: has(state.beside) ? state.beside : undefined };
}

export const throwOf = ({ data, throwName }: State): PageThrow | undefined =>
  data.throws.find(({ name }) => name === throwName);

/** Why a throw has no take to show. */
export function emptyWords({ error }: PageData, { stamp, unheld }: PageThrow): string {
  if (stamp !== undefined || unheld.length > 0) return "No take could be made.";
  return error ? "Not baked: something is wrong." : "Being baked.";
}

export function propOf({ data }: Pick<State, "data">, shown: PageThrow | undefined): PageProp | undefined {
  const name = shown?.prop;
  return name !== undefined && Object.hasOwn(data.props, name) ? data.props[name] : undefined;
}

export const takeOf = (state: State): PageTake | undefined =>
  throwOf(state)?.takes.find(({ motion }) => motion.take === state.take);

/** All takes of the throw with their numbers, as they were made. */
export function measured(state: State): Measured[] {
  const shown = throwOf(state);
  const prop = propOf(state, shown);
  return shown && prop ? measure(shown, prop) : [];
}

export const measuredOf = (state: State, number: number | undefined): Measured | undefined =>
  measured(state).find((other) => other.number === number);

/** Those that are listed, in their order. */
export function listed(state: State): Measured[] {
  const all = measured(state);
  const verdicts = new Map(all.map(({ number, take }) => [number, verdictOf(state.verdicts, take.motion)]));
  return inOrder(all, state.order, (take) => verdicts.get(take));
}

/** The take some places on in the list; the first one where the take itself is not listed. */
export function stepTake(state: State, by: number): number | undefined {
  const list = listed(state);
  const at = list.findIndex(({ number }) => number === state.take);
  if (at < 0) return list[0]?.number;
  return list[Math.max(0, Math.min(list.length - 1, at + by))].number;
}

export function stepThrow({ data, throwName }: State, by: number): string | undefined {
  const at = data.throws.findIndex(({ name }) => name === throwName);
  return data.throws[Math.max(0, Math.min(data.throws.length - 1, at + by))]?.name;
}
