/**
 * Tolerance in m where none is asked for, for a prop whose furthest point is `reach` m from its centre of mass: a
 * millimetre, which nobody sees across a room, but no more than half a percent of a small prop.
 */
export const defaultTolerance = (reach: number): number => Math.min(0.001, 0.005 * reach);
