/** Debian's Chromium without a window, WebGL in software. */

import { existsSync } from "node:fs";
import { type Browser, chromium } from "playwright-core";

/** Another place of Chromium. */
const EXECUTABLE = process.env.TOSSBAKE_CHROMIUM ?? "/usr/bin/chromium";

export const hasBrowser = existsSync(EXECUTABLE);

/** Without a browser the tests of the page are left out, openly; where everything has to be tested they fail instead. */
export const skipsWithoutBrowser = !hasBrowser && !process.env.CI;
if (skipsWithoutBrowser)
  console.warn(
    `The preview page is not tested: there is no ${EXECUTABLE} (apt-get install chromium, or name one in TOSSBAKE_CHROMIUM).`,
  );

export const launchBrowser = (): Promise<Browser> =>
  chromium.launch({
    executablePath: EXECUTABLE,
    args: [
      "--no-sandbox",
      "--use-angle=swiftshader",
      "--enable-unsafe-swiftshader",
      "--disable-background-networking",
      "--force-color-profile=srgb",
    ],
  });
