import { stat } from "node:fs/promises";
import { basename, dirname } from "node:path";
import { Command, InvalidArgumentError } from "commander";
import { watchForStop } from "../node/interrupted.js";
import { openBrowser } from "../node/open-browser.js";
import { writeFiles } from "../node/output-folder.js";
import { pageOfFolder, pageOfThrowFile } from "../node/page-file.js";
import { readPageParts } from "../node/page-parts.js";
import { FolderPreview } from "../node/preview-folder.js";
import { servePreview } from "../node/preview-server.js";
import type { PreviewSource } from "../node/preview-source.js";
import { ThrowFilePreview } from "../node/preview-throw-file.js";
import { spareInputs } from "../node/spare-inputs.js";
import { readThrowFile } from "../node/throw-file.js";
import { ExitCode } from "./exit-code.js";
import { progress } from "./progress.js";

interface Options {
  port?: number;
  open?: boolean;
  page?: string;
}

/** Where the build puts what is not imported. */
const PAGE = new URL("../page/", import.meta.url);
const WORKER = new URL("../node/preview-worker.js", import.meta.url);

export const previewCommand = (answer: (code: number) => void) =>
  new Command("preview")
    .description("show throws in a browser; what is saved is shown anew")
    .argument("<throwfile|dir>", "a throw file, or a folder that was baked into")
    .option("--port <number>", "port of 127.0.0.1 to listen on; default any that is free", portNumber)
    .option("--open", "open the browser too")
    .option("--page <file>", "write the page as one HTML file that needs nothing else, instead of serving it")
    .addHelpText(
      "after",
      "\nExamples:\n  tossbake preview quay.throws.yaml --open\n  tossbake preview out --page quay.html",
    )
    .action(async (path: string, options: Options) => {
      if (options.page === undefined) {
        await serve(path, options);
        answer(ExitCode.interrupted);
      } else if (await writePage(path, options.page)) answer(ExitCode.checkFailed);
    });

/** @returns whether a take had to be left out */
async function writePage(path: string, output: string): Promise<boolean> {
  const parts = await readPageParts(PAGE);
  const shown = progress();
  const making = (await isFolder(path))
    ? pageOfFolder(path, parts)
    : pageOfThrowFile(path, parts, { onTake: shown.update });
  const { html, inputs, unheld } = await making.finally(shown.end);
  const [folder, name] = [dirname(output), basename(output)];
  await spareInputs(folder, [name], inputs, "--page");
  await writeFiles(folder, [{ name, content: html }], "--page");
  process.stdout.write(`${path} is shown by ${output}\n`);
  for (const { name, reason } of unheld) process.stderr.write(`${name} is left out: ${reason}\n`);
  return unheld.length > 0;
}

/** Until somebody stops it. */
async function serve(path: string, { port = 0, open }: Options): Promise<void> {
  const parts = await readPageParts(PAGE);
  const stop = watchForStop();
  let fail: (error: unknown) => void = () => undefined;
  const end = new Promise<void>((done, reject) => {
    fail = reject;
    stop.signal.addEventListener("abort", () => done());
  });
  // it may fail before anybody waits for it
  end.catch(() => undefined);
  try {
    const source = await previewOf(path, fail);
    try {
      const server = await servePreview(source, parts, port);
      process.stdout.write(`${path} is shown at ${server.url} until you press Ctrl+C\n`);
      if (open && !(await openBrowser(server.url)))
        process.stderr.write("no program is found that opens a browser: copy the address into one\n");
      await end.finally(() => server.close());
    } finally {
      await source.close();
    }
  } finally {
    stop.end();
  }
}

async function previewOf(path: string, fail: (error: unknown) => void): Promise<PreviewSource> {
  if (await isFolder(path)) return FolderPreview.open(path);
  // a file that is not there is no file that is being worked on
  await readThrowFile(path);
  return new ThrowFilePreview(path, WORKER, ({ message }) => process.stderr.write(`${message}\n`), fail);
}

const isFolder = (path: string): Promise<boolean> =>
  stat(path).then(
    (status) => status.isDirectory(),
    () => false,
  );

function portNumber(text: string): number {
  const port = Number(text);
  if (!/^\d{1,5}$/.test(text) || port < 1 || port > 65535)
    throw new InvalidArgumentError("It is a whole number from 1 to 65535.");
  return port;
}
