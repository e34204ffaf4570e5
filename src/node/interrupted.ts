/** The user, or the machine's keeper, asked the program to stop. Exit code 130. */
export class Interrupted extends Error {
  override name = "Interrupted";

  constructor(message = "stopped") {
    super(message);
  }
}

/** Watches for the signals that ask a program to stop; `end` gives them back their usual meaning. */
export function watchForStop(): { signal: AbortSignal; end: () => void } {
  const stop = new AbortController();
  const asked = () => stop.abort();
  const names = ["SIGINT", "SIGTERM", "SIGHUP"] as const;
  for (const name of names) process.on(name, asked);
  return {
    signal: stop.signal,
    end: () => {
      for (const name of names) process.off(name, asked);
    },
  };
}
