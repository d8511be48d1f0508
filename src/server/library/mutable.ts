type Mutable<T> = T extends object ? { -readonly [K in keyof T]: Mutable<T[K]> } : T;

/** The engine's shapes are read-only, the contract's are not; nobody writes to either here. */
export const mutable = <T>(value: T) => value as Mutable<T>;
