/** The page's state in one place; parts of the page watch what concerns them. */

export interface Store<State, Action> {
  readonly state: State;
  send(action: Action): void;
  /** Calls `react` now and whenever one of the values that `of` picks out is another one. */
  watch<Picked extends readonly [unknown, ...unknown[]]>(
    of: (state: State) => Picked,
    react: (...picked: Picked) => void,
  ): void;
}

export function makeStore<State, Action>(
  initial: State,
  reduce: (state: State, action: Action) => State,
): Store<State, Action> {
  let state = initial;
  const watchers: (() => void)[] = [];
  return {
    get state() {
      return state;
    },
    send(action) {
      const next = reduce(state, action);
      if (next === state) return;
      state = next;
      for (const look of watchers) look();
    },
    watch(of, react) {
      let seen = of(state);
      react(...seen);
      watchers.push(() => {
        const picked = of(state);
        if (picked.every((value, i) => Object.is(value, seen[i]))) return;
        seen = picked;
        react(...picked);
      });
    },
  };
}
