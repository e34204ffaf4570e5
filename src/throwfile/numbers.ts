/** Numbers, plain and spread: ranges, bell curves, frames, and vectors of them. */

import { shown } from "./errors.js";
import { choice, type Form, type Json, list, type Tell, titled } from "./form.js";
import type { DrawableNumber, DrawableVector, Spread, SpreadVector } from "./types.js";

/** Which numbers are right, and their unit for messages. */
export interface Rule {
  readonly min?: number;
  readonly max?: number;
  /** Above this, not equal. */
  readonly above?: number;
  readonly below?: number;
  readonly whole?: boolean;
  readonly unit?: string;
}

/** Beyond this, sums and squares of what a throw is made of lose all meaning. */
const GREATEST = 1e12;

const NUMBER = String.raw`[-+]?(?:\d+(?:\.\d+)?|\.\d+)(?:[eE][-+]?\d+)?`;
const RANGE = new RegExp(`^\\s*(${NUMBER})\\s*\\.\\.\\s*(${NUMBER})\\s*$`);
const BELL = new RegExp(`^\\s*(${NUMBER})\\s*(?:±|\\+-)\\s*(${NUMBER})\\s*$`);
const FRAMES = /^\s*([-+]?\d+)f\s*$/;
const FRAME_RANGE = /^\s*([-+]?\d+)f\s*\.\.\s*([-+]?\d+)f\s*$/;

/** A plain number. */
export function number(rule: Rule = {}): Form<number> {
  const expects = describe(rule);
  return {
    read: (value, tell) => plainNumber(value, rule, expects, tell),
    json: numberJson(rule),
    expects,
  };
}

/** A number that may be spread: `1.5..2.5`, `2 ± 0.2`, `{pick: […]}`, `{each: […]}`. */
export function spreadNumber(rule: Rule = {}): Form<DrawableNumber> {
  const single = number(rule);
  const expects = `${single.expects}, or a spread such as ${exampleRange(rule)} or {pick: […]}`;
  return choice(
    {
      read: (value, tell) =>
        typeof value === "string"
          ? spread(value, rule, expects, tell)
          : plainNumber(value, rule, expects, tell),
      json: { anyOf: [single.json, pattern(RANGE), pattern(BELL)] },
      expects,
    },
    { ...single, expects: `${single.expects}; no spread within a choice` },
  );
}

/** Any finite number, perhaps spread. */
export const anyNumber = titled("number", spreadNumber());

/** A time in seconds, or in whole frames (`27f`), perhaps spread; comes out in seconds. */
export function time(rule: Rule, frameRate: number): Form<DrawableNumber> {
  const seconds: Rule = { ...rule, unit: "seconds" };
  const forms = "whole frames such as 27f";
  const expects = `${describe(seconds)}, ${forms}, or a spread such as 0.9..1.1, 22f..26f or {pick: […]}`;
  const plain = (value: unknown, tell: Tell, right: string): number | undefined => {
    const frames = typeof value === "string" ? FRAMES.exec(value) : null;
    if (frames === null) return plainNumber(value, seconds, right, tell);
    return within(Number(frames[1]) / frameRate, value, seconds, right, tell);
  };
  const item: Form<number> = {
    read: (value, tell) => plain(value, tell, `${describe(seconds)}, or ${forms}`),
    json: { anyOf: [numberJson(rule), pattern(FRAMES)] },
    expects: `${describe(seconds)}, or ${forms}`,
  };
  return choice(
    {
      read(value, tell) {
        if (typeof value !== "string" || FRAMES.test(value)) return plain(value, tell, expects);
        const ends = FRAME_RANGE.exec(value);
        if (ends === null) return spread(value, seconds, expects, tell);
        const low = Number(ends[1]) / frameRate;
        const range = rangeOf(low, Number(ends[2]) / frameRate, value, seconds, expects, tell);
        return range && { range, frames: frameRate };
      },
      json: {
        anyOf: [numberJson(rule), pattern(FRAMES), pattern(RANGE), pattern(FRAME_RANGE), pattern(BELL)],
      },
      expects,
    },
    item,
  );
}

/** Bounds `a..b`, never drawn. */
export function bounds(rule: Rule): Form<readonly [number, number]> {
  const expects = `bounds such as 1..2, each end ${describe(rule)}`;
  return {
    read(value, tell) {
      const ends = typeof value === "string" ? RANGE.exec(value) : null;
      if (ends !== null) return rangeOf(Number(ends[1]), Number(ends[2]), ends[0], rule, expects, tell);
      tell(`not bounds (found ${shown(value)})`, expects);
      return undefined;
    },
    json: pattern(RANGE),
    expects,
  };
}

/** [x, y, z] of plain numbers. */
export function vector(rule: Rule = {}): Form<[number, number, number]> {
  return list(number(rule), 3, 3, "a list of three numbers [x, y, z]") as Form<[number, number, number]>;
}

/** [x, y, z], each perhaps spread. */
export function spreadVector(): Form<SpreadVector> {
  return titled(
    "vector",
    list(anyNumber, 3, 3, "a list of three numbers [x, y, z]"),
  ) as unknown as Form<SpreadVector>;
}

/** [x, y, z], each perhaps spread, or a choice among such. */
export const drawnVector = (): Form<DrawableVector> => titled("place", choice(spreadVector()));

/** The unit in brackets: "a number from -90 to 90 (degrees)". */
export function describe(rule: Rule): string {
  const low = rule.above ?? rule.min;
  const high = rule.below ?? rule.max;
  let text = rule.whole ? "a whole number" : "a number";
  if (low !== undefined && high !== undefined && rule.above === undefined)
    text += ` from ${low} to ${rule.below !== undefined ? "below " : ""}${high}`;
  else if (rule.above !== undefined) text += ` above ${low}${high !== undefined ? ` up to ${high}` : ""}`;
  else if (low !== undefined) text += `, ${low} or more`;
  else if (high !== undefined) text += `, ${high} or less`;
  return rule.unit ? `${text} (${rule.unit})` : text;
}

function plainNumber(value: unknown, rule: Rule, expects: string, tell: Tell): number | undefined {
  if (typeof value === "number") return within(value, value, rule, expects, tell);
  const quoted = typeof value === "string" && value.trim() !== "" && Number.isFinite(Number(value));
  tell(
    `not a number (found ${quoted ? "text " : ""}${shown(value)})`,
    quoted ? `${expects}, without quotes` : expects,
  );
  return undefined;
}

function within(x: number, found: unknown, rule: Rule, expects: string, tell: Tell): number | undefined {
  const what = typeof found === "string" ? shown(found) : String(x);
  if (!Number.isFinite(x)) tell(`not a finite number (found ${what})`, expects);
  else if (Math.abs(x) > GREATEST) tell(`too great (found ${what})`, `${expects}, within ${GREATEST}`);
  else if (rule.whole && !Number.isInteger(x)) tell(`not a whole number (found ${what})`, expects);
  else if (!inside(rule, x)) tell(`out of range (found ${what})`, expects);
  else return x;
  return undefined;
}

function inside(rule: Rule, x: number): boolean {
  return (
    x >= (rule.min ?? -GREATEST) &&
    x <= (rule.max ?? GREATEST) &&
    !(rule.above !== undefined && x <= rule.above) &&
    !(rule.below !== undefined && x >= rule.below)
  );
}

function spread(text: string, rule: Rule, expects: string, tell: Tell): Spread<number> | undefined {
  const ends = RANGE.exec(text);
  if (ends !== null) {
    const range = rangeOf(Number(ends[1]), Number(ends[2]), text, rule, expects, tell);
    return range && { range };
  }
  const bell = BELL.exec(text);
  if (bell === null) {
    tellNoSpread(text, rule, expects, tell);
    return undefined;
  }
  const mean = Number(bell[1]);
  const deviation = Number(bell[2]);
  if (deviation < 0) {
    tell(`a negative deviation (found ${shown(text)})`, "mean ± deviation, such as 2 ± 0.2");
    return undefined;
  }
  for (const end of [mean - 3 * deviation, mean + 3 * deviation])
    if (!inside(rule, end) || Math.abs(end) > GREATEST) {
      tell(
        `the curve, cut at three deviations, reaches ${Number(end.toPrecision(6))} (found ${shown(text)})`,
        `every value drawn must be ${describe(rule)}`,
      );
      return undefined;
    }
  return { normal: [mean, deviation] };
}

function tellNoSpread(text: string, rule: Rule, expects: string, tell: Tell): void {
  if (!/\d\s*f\b/.test(text)) plainNumber(text, rule, expects, tell);
  else if (!expects.includes("frames")) tell(`frames where no time stands (found ${shown(text)})`, expects);
  else if (text.includes(".."))
    tell(`not a range of whole frames (found ${shown(text)})`, "both ends with an f, such as 22f..26f");
  else if (/±|\+-/.test(text))
    tell(`a bell curve in frames (found ${shown(text)})`, "seconds, such as 0.9 ± 0.1");
  else tell(`not whole frames (found ${shown(text)})`, expects);
}

function rangeOf(
  low: number,
  high: number,
  text: string,
  rule: Rule,
  expects: string,
  tell: Tell,
): [number, number] | undefined {
  if (low > high) {
    tell(`a range the wrong way round (found ${shown(text)})`, "the smaller end first");
    return undefined;
  }
  for (const end of [low, high]) if (within(end, text, rule, expects, tell) === undefined) return undefined;
  return [low, high];
}

/** A range within the rule, as an example. */
function exampleRange(rule: Rule): string {
  const low = rule.above ?? rule.min;
  return low === undefined || low < 1.5 ? "1.5..2.5" : `${low + 1}..${low + 2}`;
}

function numberJson(rule: Rule): Json {
  const json: Record<string, unknown> = { type: rule.whole ? "integer" : "number" };
  if (rule.min !== undefined) json.minimum = rule.min;
  if (rule.max !== undefined) json.maximum = rule.max;
  if (rule.above !== undefined) json.exclusiveMinimum = rule.above;
  if (rule.below !== undefined) json.exclusiveMaximum = rule.below;
  return json;
}

function pattern(regex: RegExp): Json {
  return { type: "string", pattern: regex.source };
}
