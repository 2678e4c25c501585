/** Prints one figure as `npm run bench` promises: `name value unit`, the value with three significant digits or more. */
export const figure = (name: string, value: number, unit: string): void => {
  if (!Number.isFinite(value)) throw new Error(`${name} has no value`);
  const digits = Math.max(0, 2 - Math.floor(Math.log10(Math.max(Math.abs(value), 0.01))));
  process.stdout.write(`${name} ${value.toFixed(digits)} ${unit}\n`);
};
