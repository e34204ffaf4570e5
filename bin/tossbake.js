#!/usr/bin/env node
import "./small-heap.js";
import { main, ownFault } from "../dist/cli/main.js";

process.stdout.on("error", (error) => {
  // a reader that has seen enough (head, less) is no fault
  if (error.code === "EPIPE") return;
  process.stderr.write(`standard output: cannot be written (${error.code})\n`);
  process.exit(3);
});

// what is thrown where nobody waits for it: Node's own code for it is 1, which here means that a check failed
process.on("uncaughtException", (error) => {
  process.stderr.write(ownFault(error));
  process.exit(3);
});

process.exitCode = await main(process.argv.slice(2));
