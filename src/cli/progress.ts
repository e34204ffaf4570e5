/** A bar on standard error, and only on a terminal. */
export function progress(): { update: (done: number, total: number) => void; end: () => void } {
  if (!process.stderr.isTTY) return { update: () => undefined, end: () => undefined };
  const width = 30;
  let shown = -1;
  return {
    update: (done, total) => {
      const filled = Math.floor((done / total) * width);
      if (filled === shown && done !== total) return;
      shown = filled;
      process.stderr.write(`\r${"=".repeat(filled)}${"-".repeat(width - filled)} take ${done} of ${total}`);
    },
    end: () => process.stderr.write("\r\u001b[K"),
  };
}
