/** The shape of a set of messages in another language: the same keys, every leaf a text. */
export type SameKeys<T> = { [K in keyof T]: T[K] extends string ? string : SameKeys<T[K]> };
