/** What the parts of the page work with. */

import type { Files } from "./files.js";
import type { Player } from "./player.js";
import type { Stage } from "./stage.js";
import type { Action, State } from "./state.js";
import type { Store } from "./store.js";
import type { Strips } from "./strips.js";

export interface App {
  store: Store<State, Action>;
  player: Player;
  stage: Stage;
  files: Files;
  strips: Strips;
  /** Says it to screen readers. */
  say(text: string): void;
}
