/** Kinds of tokens of jsonc-parser's scanner, whose own enumeration is gone once it is compiled. */

export const OPEN_BRACE = 1;
export const CLOSE_BRACE = 2;
export const OPEN_BRACKET = 3;
export const CLOSE_BRACKET = 4;
export const COMMA = 5;
export const COLON = 6;
export const STRING = 10;
export const END = 17;
