/** The page's markup around its parts: as it comes from a server, and as one file. */

import { base64 } from "../math/base64.js";
import { sha256 } from "../math/hash.js";
import { DATA_ID, FILE_CLASS, FILE_NAME } from "./embedded.js";
import type { PageData } from "./page-data.js";

/** What the bundler makes of `src/review/page`. */
export interface PageParts {
  script: string;
  style: string;
  /** Markup of the body, without scripts. */
  body: string;
}

/**
 * What a page may load: its own script and style, and what the reader of models makes of their textures. No WebAssembly, which decoders
 * would need: models come unpacked (`node/plain-glb.ts`), so that the policy can stay as strict as it is.
 */
const POLICY = "default-src 'none'; img-src data: blob:; base-uri 'none'; form-action 'none'";

/** Sent with the page of a server. */
export const SERVER_POLICY = `${POLICY}; script-src 'self'; style-src 'self'; connect-src 'self' blob:; frame-ancestors 'none'`;

/** The page whose script, style, data and files come from where it comes from. */
export const servedPage = ({ body }: Pick<PageParts, "body">, title: string): string =>
  page(
    title,
    '<link rel="stylesheet" href="page.css">',
    `${body.trim()}\n<script type="module" src="page.js"></script>`,
  );

/**
 * The page as one file that needs nothing else; the same parts make the same bytes.
 *
 * @param files all that the data speak of
 */
export async function onePage(
  { script, style, body }: PageParts,
  data: PageData,
  files: readonly { name: string; content: Uint8Array }[],
): Promise<string> {
  const policy = `${POLICY}; script-src '${await sourceHash(script)}'; style-src '${await sourceHash(style)}'; connect-src blob: data:`;
  const json = JSON.stringify(data).replaceAll("<", "\\u003c");
  const held = files.map(
    ({ name, content }) =>
      `<script type="text/plain" class="${FILE_CLASS}" ${FILE_NAME}="${escaped(name)}">${base64(content)}</script>`,
  );
  return page(
    data.title,
    `<meta http-equiv="Content-Security-Policy" content="${escaped(policy)}">\n<style>${style}</style>`,
    [
      body.trim(),
      `<script type="application/json" id="${DATA_ID}">${json}</script>`,
      ...held,
      `<script type="module">${script}</script>`,
    ].join("\n"),
  );
}

const page = (title: string, head: string, body: string): string => `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<title>${escaped(title)} · tossbake</title>
<link rel="icon" href="data:,">
${head}
</head>
<body>
${body}
</body>
</html>
`;

const ENTITIES: Record<string, string> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

const escaped = (text: string): string => text.replace(/[&<>"']/g, (character) => ENTITIES[character]);

/** As a Content-Security-Policy names an element's text. */
async function sourceHash(text: string): Promise<string> {
  const hex = await sha256(new TextEncoder().encode(text));
  return `sha256-${base64(Uint8Array.from(hex.match(/../g) ?? [], (pair) => Number.parseInt(pair, 16)))}`;
}
