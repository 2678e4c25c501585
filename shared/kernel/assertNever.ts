/** Ends an exhaustive `switch`: fails to compile while a case is missing, and throws if one slips in at run time. */
export function assertNever(value: never): never {
  throw new Error(`Unexpected value: ${JSON.stringify(value)}`);
}
