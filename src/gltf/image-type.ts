/** Media types of images by their first bytes (each format's own specification); undefined for any other. */
export function imageType(bytes: Uint8Array): string | undefined {
  const starts = (at: number, ...expected: number[]): boolean =>
    expected.every((byte, i) => bytes[at + i] === byte);
  if (starts(0, 0x89, 0x50, 0x4e, 0x47)) return "image/png";
  if (starts(0, 0xff, 0xd8, 0xff)) return "image/jpeg";
  if (starts(0, 0x52, 0x49, 0x46, 0x46) && starts(8, 0x57, 0x45, 0x42, 0x50)) return "image/webp";
  if (starts(0, 0xab, 0x4b, 0x54, 0x58, 0x20, 0x32, 0x30, 0xbb)) return "image/ktx2";
  if (starts(4, 0x66, 0x74, 0x79, 0x70, 0x61, 0x76, 0x69, 0x66)) return "image/avif";
  return undefined;
}
