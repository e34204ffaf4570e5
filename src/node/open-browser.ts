/** Shows an address in the browser that this machine prefers. */

import { spawn } from "node:child_process";

/** @returns whether there is a program that opens addresses */
export function openBrowser(url: string): Promise<boolean> {
  const [program, ...args] = OPENERS[process.platform] ?? ["xdg-open"];
  return new Promise((answer) => {
    const opener = spawn(program, [...args, url], { stdio: "ignore", detached: true });
    opener.on("error", () => answer(false));
    opener.on("spawn", () => answer(true));
    opener.unref();
  });
}

const OPENERS: Partial<Record<NodeJS.Platform, string[]>> = {
  darwin: ["open"],
  win32: ["explorer"],
};
