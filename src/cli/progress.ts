/** Seconds after which a rate is worth telling. */
const SETTLED = 1;
/** Milliseconds between two drawings. */
const PAUSE = 100;
const WIDTH = 30;

/** A bar on standard error with the rate and the time left, and only on a terminal. */
export function progress(): { update: (done: number, total: number) => void; end: () => void } {
  if (!process.stderr.isTTY) return { update: () => undefined, end: () => undefined };
  let first: { done: number; at: number } | undefined;
  let shownAt = Number.NEGATIVE_INFINITY;
  return {
    update(done, total) {
      const at = performance.now();
      // what an earlier run has made says nothing of this one's pace
      first ??= { done, at };
      if (at - shownAt < PAUSE && done !== total) return;
      shownAt = at;
      const filled = total > 0 ? Math.floor((done / total) * WIDTH) : WIDTH;
      const bar = `${"=".repeat(filled)}${"-".repeat(WIDTH - filled)}`;
      const pace = paceText(done - first.done, total - done, (at - first.at) / 1000);
      process.stderr.write(`\r${bar} take ${done} of ${total}${pace}\u001b[K`);
    },
    end: () => process.stderr.write("\r\u001b[K"),
  };
}

/** ", 120 a second, 2 min left", once there is something to go by. */
function paceText(done: number, left: number, seconds: number): string {
  if (done <= 0 || seconds < SETTLED) return "";
  const rate = done / seconds;
  return `, ${rate >= 10 ? Math.round(rate) : rate.toPrecision(2)} a second, ${timeText(left / rate)} left`;
}

function timeText(seconds: number): string {
  if (seconds < 60) return `${Math.ceil(seconds)} s`;
  const minutes = Math.ceil(seconds / 60);
  return minutes < 60 ? `${minutes} min` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}
