import { useSyncExternalStore } from 'react';
import type { Store } from './store.ts';

export const useStore = <T>(store: Store<T>): T =>
  useSyncExternalStore(store.subscribe, store.get, store.get);
