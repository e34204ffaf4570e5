import { describe, expect, it } from "vitest";
import {
  type Action,
  emptyWords,
  firstState,
  listed,
  measuredOf,
  reduce,
  type State,
  stepTake,
  stepThrow,
} from "../../src/review/page/state.js";
import { NO_VERDICTS, verdictOf } from "../../src/review/page/verdicts.js";
import { bakedPage, sent, THROWS } from "./page-fixture.js";

const data = await bakedPage();
const start = () => firstState(data, { playing: false, verdicts: NO_VERDICTS });
const doing = (state: State, ...actions: Action[]): State => actions.reduce(reduce, state);
const numbers = (state: State) => listed(state).map(({ number }) => number);

describe("what the page shows", () => {
  it("is the first take of the first throw at first, and of another throw its first", () => {
    expect(start()).toMatchObject({ throwName: "lob", take: 1, beside: undefined });
    const moved = doing(start(), { type: "take", take: 4 }, { type: "beside", take: 2 });
    expect(doing(moved, { type: "throw", name: "drop" })).toMatchObject({
      throwName: "drop",
      take: 1,
      beside: undefined,
    });
  });

  it("passes over a throw that is not baked yet", () => {
    const [lob, ...others] = data.throws;
    const waiting = { ...data, throws: [{ ...lob, takes: [], stamp: undefined }, ...others] };
    expect(firstState(waiting, { playing: false, verdicts: NO_VERDICTS }).throwName).toBe("drop");
  });

  it("is nothing in a file without throws", () => {
    const state = firstState({ ...data, throws: [] }, { playing: true, verdicts: NO_VERDICTS });
    expect([state.throwName, state.take, listed(state), stepTake(state, 1)]).toEqual([
      undefined,
      undefined,
      [],
      undefined,
    ]);
    expect(doing(state, { type: "verdict", verdict: "accepted" })).toBe(state);
  });

  it("goes along the takes and throws and stops at the ends", () => {
    const last = doing(start(), { type: "take", take: 6 });
    expect([stepTake(start(), 1), stepTake(start(), -1), stepTake(last, 1)]).toEqual([2, 1, 6]);
    expect([stepThrow(start(), 1), stepThrow(start(), -1)]).toEqual(["drop", "lob"]);
  });
});

describe("new data", () => {
  it("leave what is looked at where it is still there", () => {
    const looking = doing(start(), { type: "take", take: 5 }, { type: "beside", take: 3 });
    const same = doing(looking, { type: "data", data: sent(data) });
    expect(same).toMatchObject({ throwName: "lob", take: 5, beside: 3 });
  });

  it("leave a throw and a prop that did not change the same objects", () => {
    const same = doing(start(), { type: "data", data: sent(data) });
    expect(same.data.throws[0]).toBe(data.throws[0]);
    expect(same.data.props.plank).toBe(data.props.plank);
  });

  it("take another take where the old one is gone, and another throw where that is gone", async () => {
    const fewer = await bakedPage(THROWS.replaceAll("takes: 6", "takes: 2"));
    const looking = doing(start(), { type: "take", take: 5 }, { type: "beside", take: 1 });
    const state = doing(looking, { type: "data", data: fewer });
    expect(state).toMatchObject({ throwName: "lob", take: 1, beside: 1 });
    const without = { ...fewer, throws: fewer.throws.filter(({ name }) => name !== "lob") };
    expect(doing(state, { type: "data", data: without }).throwName).toBe("drop");
  });

  it("with an error keep the old takes, and say so where there are none", () => {
    const error = { message: "wrong", line: 1, column: 1 };
    const [lob, ...others] = sent(data).throws;
    const state = doing(start(), { type: "data", data: { ...sent(data), error } });
    expect(numbers(state)).toEqual([1, 2, 3, 4, 5, 6]);
    const unbaked = { ...lob, takes: [], stamp: undefined };
    expect(emptyWords({ ...data, error }, unbaked)).toBe("Not baked: something is wrong.");
    expect(emptyWords(data, unbaked)).toBe("Being baked.");
    expect(emptyWords(data, { ...others[0], takes: [] })).toBe("No take could be made.");
  });
});

describe("the order of takes", () => {
  it("is by any number, from the end that is mostly looked for, and turned round", () => {
    const byWobble = doing(start(), { type: "order", by: "wobble" });
    const wobbles = listed(byWobble).map(({ wobble }) => wobble!);
    expect(wobbles).toEqual([...wobbles].sort((a, b) => b - a));
    const turned = doing(byWobble, { type: "sift", change: { highFirst: false } });
    expect(numbers(turned)).toEqual(numbers(byWobble).reverse());
  });

  it("keeps to the bounds that are asked for, and drops them with another number", () => {
    const byTime = doing(start(), { type: "order", by: "time" });
    const [first, second] = listed(byTime);
    const sifted = doing(byTime, { type: "sift", change: { most: second.time } });
    expect(numbers(sifted)).toEqual([first.number, second.number]);
    expect(numbers(doing(sifted, { type: "order", by: "turns" }))).toHaveLength(6);
  });

  it("puts takes without the number last, whichever way it goes", () => {
    const odd = sent(data);
    odd.throws[0].takes[2].record.miss.position = null;
    odd.throws[0].stamp = "other";
    const state = doing(firstState(odd, { playing: false, verdicts: NO_VERDICTS }), {
      type: "order",
      by: "miss",
    });
    expect(numbers(state).at(-1)).toBe(3);
    expect(numbers(doing(state, { type: "sift", change: { highFirst: false } })).at(-1)).toBe(3);
  });
});

describe("deciding", () => {
  it("is on the take that is looked at", () => {
    const state = doing(start(), { type: "take", take: 3 }, { type: "verdict", verdict: "rejected" });
    expect(verdictOf(state.verdicts, measuredOf(state, 3)!.take.motion)).toBe("rejected");
    expect(state.take).toBe(3);
  });

  it("goes on to the next take where only undecided ones are listed", () => {
    let state = doing(start(), { type: "sift", change: { keep: "open" } }, { type: "take", take: 5 });
    state = doing(state, { type: "verdict", verdict: "accepted" });
    expect([state.take, numbers(state)]).toEqual([6, [1, 2, 3, 4, 6]]);
    state = doing(state, { type: "verdict", verdict: "accepted" });
    expect(state.take).toBe(4);
    expect(numbers(doing(state, { type: "sift", change: { keep: "accepted" } }))).toEqual([5, 6]);
  });

  it("is forgotten for this throw alone", () => {
    let state = doing(start(), { type: "verdict", verdict: "accepted" }, { type: "throw", name: "drop" });
    state = doing(state, { type: "verdict", verdict: "rejected" }, { type: "clear" });
    expect(verdictOf(state.verdicts, data.throws[1].takes[0].motion)).toBeUndefined();
    expect(verdictOf(state.verdicts, data.throws[0].takes[0].motion)).toBe("accepted");
  });
});
