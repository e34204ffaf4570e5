#!/usr/bin/env node
import { main } from "../dist/cli/main.js";

process.stdout.on("error", (error) => {
  // a reader that has seen enough (head, less) is no fault
  if (error.code === "EPIPE") return;
  process.stderr.write(`standard output: cannot be written (${error.code})\n`);
  process.exit(3);
});

process.exitCode = await main(process.argv.slice(2));
