/** The two kinds of URI a model may carry: data: URIs, and files in its own folder or below (RFC 3986, RFC 2397). */

import { base64 } from "../math/base64.js";
import { ModelError } from "./model.js";

export const isDataUri = (uri: string): boolean => /^data:/i.test(uri);

/**
 * The file a relative URI names, percent-decoded, its parts parted by "/". Throws ModelError for any that is absolute,
 * has a scheme or could lead out of the folder, however it is written.
 */
export function relativePath(model: string, where: string, uri: string): string {
  const refuse = (why: string): never => {
    throw new ModelError(
      model,
      `${where} "${shown(uri)}" ${why}`,
      "a model may only name files in its own folder or below, by a relative path",
    );
  };
  let path: string;
  try {
    path = decodeURIComponent(uri);
  } catch {
    return refuse("is not percent-encoded properly");
  }
  if (path === "") refuse("is empty");
  // A drive letter ("C:") reads as a scheme.
  if (/^[a-z][a-z0-9+.-]*:/i.test(path)) refuse("has a scheme");
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  if (/[\u0000-\u001f\u007f]/.test(path)) refuse("has control characters");
  if (path.includes("\\")) refuse("has a backslash");
  if (path.startsWith("/")) refuse("is absolute");
  if (path.split("/").includes("..")) refuse("leads to a parent folder");
  return path;
}

/** Content of a base64 data: URI. */
export function dataUriBytes(model: string, where: string, uri: string): Uint8Array {
  const comma = uri.indexOf(",");
  if (comma < 0 || !/;base64$/i.test(uri.slice(0, comma)))
    throw new ModelError(
      model,
      `${where} "${shown(uri)}" is not base64`,
      "data: URIs must end their head in ;base64,",
    );
  let binary: string;
  try {
    binary = atob(uri.slice(comma + 1));
  } catch {
    throw new ModelError(model, `${where} holds characters that are not base64`, "the file is damaged");
  }
  const bytes = new Uint8Array(binary.length);
  for (let i = 0; i < binary.length; i++) bytes[i] = binary.charCodeAt(i);
  return bytes;
}

/** The base64 data: URI of `bytes`. */
export const bytesDataUri = (bytes: Uint8Array): string =>
  `data:application/octet-stream;base64,${base64(bytes)}`;

const shown = (uri: string): string => (uri.length > 60 ? `${uri.slice(0, 60)}…` : uri);
