// The functions of Math that an engine may compute as it likes (ECMA-262, 21.3.2: implementation-approximated).
export const NAMES =
  "acos acosh asin asinh atan atanh atan2 cbrt cos cosh exp expm1 hypot log log1p log10 log2 pow sin sinh tan tanh".split(
    " ",
  );
