#!/usr/bin/env node
import { main } from "../dist/cli/main.js";

// a reader that has seen enough (head, less) is no fault
process.stdout.on("error", (error) => {
  if (error.code !== "EPIPE") throw error;
});

process.exitCode = await main(process.argv.slice(2));
