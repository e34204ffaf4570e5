/** "1 take", "263 takes" */
export const counted = (count: number, what: string): string => `${count} ${what}${count === 1 ? "" : "s"}`;
