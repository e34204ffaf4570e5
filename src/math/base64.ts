/** Bytes as base64 (RFC 4648, 4), in browsers and on Node. */
export function base64(bytes: Uint8Array): string {
  const parts: string[] = [];
  // a call takes only so many arguments; whole groups of three leave no padding within
  for (let i = 0; i < bytes.length; i += PART)
    parts.push(btoa(String.fromCharCode(...bytes.subarray(i, i + PART))));
  return parts.join("");
}

const PART = 3 * 4096;
