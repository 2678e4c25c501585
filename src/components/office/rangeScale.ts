/** Ticks of the scale of torques, N·m. */
export const RANGE_TICKS = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000] as const;

const LEFT = 34;
const RIGHT = 46;

/** Where a torque stands on a logarithmic scale from 1 to 1000 N·m of that width; what lies beyond is held at the end. */
export const logPlace = (newtonMetres: number, width: number): number => {
  const share = Math.log10(Math.min(1000, Math.max(1, newtonMetres))) / 3;
  return LEFT + share * (width - LEFT - RIGHT);
};
