/** How a person wants the lanes: which, in what order, how high, which way up, on whose scale. Only the view; no sample changes. */
export interface LaneSetup {
  /** Signal indices from top to bottom; those not named follow in the capture's order. */
  readonly order: readonly number[];
  readonly hidden: ReadonlySet<number>;
  /** Upside down. */
  readonly inverted: ReadonlySet<number>;
  /** Lanes of one unit share one scale. */
  readonly common: boolean;
  /** Share of the height; 1 where a lane is not named. */
  readonly weights: ReadonlyMap<number, number>;
}

export const PLAIN_SETUP: LaneSetup = {
  order: [],
  hidden: new Set(),
  inverted: new Set(),
  common: false,
  weights: new Map(),
};

/** The capture's signals in the order wanted, hidden ones left out. */
export function shownIn<T extends { readonly index: number }>(signals: readonly T[], setup: LaneSetup): T[] {
  return inOrder(signals, setup).filter(({ index }) => !setup.hidden.has(index));
}

/** All signals in the order wanted. */
export function inOrder<T extends { readonly index: number }>(signals: readonly T[], setup: LaneSetup): T[] {
  const place = (index: number) => {
    const at = setup.order.indexOf(index);
    return at < 0 ? setup.order.length : at;
  };
  return [...signals].sort((a, b) => place(a.index) - place(b.index));
}
