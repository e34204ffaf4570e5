/** Serves the preview page to this machine alone. */

import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { type PageParts, SERVER_POLICY, servedPage } from "../review/page-shell.js";
import { MachineError } from "./machine-error.js";
import type { PreviewSource } from "./preview-source.js";

export interface PreviewServer {
  /** Where the page is. */
  url: string;
  close(): Promise<void>;
}

/** The loopback address: nobody else reaches it. */
const ADDRESS = "127.0.0.1";

/** ms: changes that come faster are told together. */
const TOGETHER = 100;

interface Reply {
  type: string;
  content: string | Uint8Array;
}

/**
 * Answers GET and HEAD of the page, its data and files, and nothing else, to requests that name this machine and come from the page itself or from nowhere.
 *
 * @param port 0: any that is free
 * @throws MachineError where the port cannot be had
 */
export async function servePreview(
  source: PreviewSource,
  parts: PageParts,
  port: number,
): Promise<PreviewServer> {
  const listening = new Set<ServerResponse>();
  const server = createServer((request, response) => {
    answer(request, response).catch((error: Error) => refuse(response, 500, error.message));
  });
  await listen(server, port);
  const { port: actual } = server.address() as AddressInfo;
  const hosts = [`${ADDRESS}:${actual}`, `localhost:${actual}`];

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    for (const [name, value] of Object.entries(HEADERS)) response.setHeader(name, value);
    const { host, origin } = request.headers;
    if (
      !hosts.includes(host ?? "") ||
      (origin !== undefined && !hosts.some((own) => origin === `http://${own}`))
    )
      return refuse(response, 403, "this server answers only the machine it runs on");
    if (request.method !== "GET" && request.method !== "HEAD") {
      response.setHeader("Allow", "GET, HEAD");
      return refuse(response, 405, "this server only shows");
    }
    const url = request.url ?? "";
    if (url === "/events") return listenTo(request, response);
    const reply = await replyTo(url);
    if (!reply) return refuse(response, 404, "there is nothing here");
    response.writeHead(200, {
      "Content-Type": reply.type,
      "Content-Length": Buffer.byteLength(reply.content),
    });
    response.end(request.method === "HEAD" ? undefined : reply.content);
  }

  async function replyTo(url: string): Promise<Reply | undefined> {
    const [path, query] = url.split("?", 2);
    if (path === "/data.json") {
      const looking = new URLSearchParams(query).get("throw") ?? undefined;
      return { type: "application/json; charset=utf-8", content: JSON.stringify(await source.data(looking)) };
    }
    if (path.startsWith("/files/")) {
      const name = decoded(path.slice("/files/".length));
      const content = name === undefined ? undefined : await source.file(name);
      return content && { type: "model/gltf-binary", content };
    }
    switch (path) {
      case "/":
        source.opening?.();
        return { type: "text/html; charset=utf-8", content: servedPage(parts, source.title) };
      case "/drawn":
        source.drawn?.();
        return { type: "text/plain; charset=utf-8", content: "" };
      case "/page.js":
        return { type: "text/javascript; charset=utf-8", content: parts.script };
      case "/page.css":
        return { type: "text/css; charset=utf-8", content: parts.style };
    }
    return undefined;
  }

  /** Server-sent events (WHATWG HTML, 9.2): one for each change. */
  function listenTo(request: IncomingMessage, response: ServerResponse): void {
    response.writeHead(200, { "Content-Type": "text/event-stream" });
    if (request.method === "HEAD") {
      response.end();
      return;
    }
    response.write("retry: 500\n\n");
    listening.add(response);
    response.on("close", () => listening.delete(response));
  }

  let soon: NodeJS.Timeout | undefined;
  source.onChange(() => {
    soon ??= setTimeout(() => {
      soon = undefined;
      for (const response of listening) response.write("event: change\ndata:\n\n");
    }, TOGETHER);
  });

  return {
    url: `http://${hosts[0]}/`,
    async close() {
      clearTimeout(soon);
      for (const response of listening) response.end();
      server.closeAllConnections();
      await new Promise((done) => server.close(done));
    },
  };
}

const HEADERS = {
  "Content-Security-Policy": SERVER_POLICY,
  "X-Content-Type-Options": "nosniff",
  "Cache-Control": "no-store",
  "Referrer-Policy": "no-referrer",
  "Cross-Origin-Opener-Policy": "same-origin",
  "Cross-Origin-Resource-Policy": "same-origin",
};

function refuse(response: ServerResponse, status: number, why: string): void {
  response.writeHead(status, { "Content-Type": "text/plain; charset=utf-8" });
  response.end(`${why}\n`);
}

/** Undefined for what is no percent-encoding. */
function decoded(text: string): string | undefined {
  try {
    return decodeURIComponent(text);
  } catch {
    return undefined;
  }
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((done, fail) => {
    server.once("error", (error: NodeJS.ErrnoException) => {
      const reason = REASONS[error.code ?? ""] ?? error.code ?? error.message;
      fail(
        new MachineError(
          `port ${port} of ${ADDRESS}: ${reason}; choose another with --port, or leave it out`,
        ),
      );
    });
    server.listen(port, ADDRESS, done);
  });
}

const REASONS: Record<string, string> = {
  EADDRINUSE: "something else is listening there",
  EACCES: "no permission to listen there",
};
