/** The store bound to React. */
import { createContext, useContext } from 'react';
import { useStore } from 'zustand';
import type { Project, ValueEntry } from './project.ts';
import type { BenchActions, BenchState, BenchStore } from './store.ts';

export const StoreContext = createContext<BenchStore | null>(null);

export function useBenchStore(): BenchStore {
  const store = useContext(StoreContext);
  if (store === null) throw new Error('useBenchStore: expected a store above');
  return store;
}

export function useBench<T>(pick: (state: BenchState & BenchActions) => T): T {
  return useStore(useBenchStore(), pick);
}

export function useProject(): Project {
  return useBench((s) => s.history.present);
}

export function useSelected(): ValueEntry {
  const project = useProject();
  return (project.values.find((v) => v.id === project.selected) ?? project.values[0]) as ValueEntry;
}
