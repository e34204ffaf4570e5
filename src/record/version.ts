/** The package's version, as takes.json states it; kept equal to package.json by a test. */
export const VERSION = "0.1.0";
