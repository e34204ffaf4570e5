/** SHA-256 as lower-case hex, by the platform's Web Crypto (browsers and Node alike). */
export async function sha256(...parts: readonly Uint8Array[]): Promise<string> {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let offset = 0;
  for (const part of parts) {
    whole.set(part, offset);
    offset += part.length;
  }
  const digest = await globalThis.crypto.subtle.digest("SHA-256", whole);
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, "0")).join("");
}

/** The hash of a text with LF line ends and no byte order mark, so that a checkout's line ends do not count. */
export const textSha256 = (text: string): Promise<string> =>
  sha256(new TextEncoder().encode(text.replace(/^\uFEFF/, "").replace(/\r\n?/g, "\n")));
