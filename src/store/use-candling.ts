import { createContext, useContext, useMemo } from 'react';
import { useStore } from 'zustand';
import { useShallow } from 'zustand/react/shallow';
import { type BenchSelection, selectBench } from './bench-selection.ts';
import type { Candling } from './candling.ts';
import type { DocumentState } from './document-store.ts';
import type { ResultsState } from './results-store.ts';
import type { ViewState } from './view-store.ts';

/** The one Candling of the page; given by the composition root. */
export const CandlingContext = createContext<Candling | undefined>(undefined);

export function useCandling(): Candling {
  const candling = useContext(CandlingContext);
  if (candling === undefined) throw new Error('useCandling needs a CandlingContext above it');
  return candling;
}

/** A slice of the document store; objects made by the selector are compared member by member. */
export function useDocument<T>(select: (state: DocumentState) => T): T {
  return useStore(useCandling().document, useShallow(select));
}

export function useView<T>(select: (state: ViewState) => T): T {
  return useStore(useCandling().view, useShallow(select));
}

export function useResults<T>(select: (state: ResultsState) => T): T {
  return useStore(useCandling().results, useShallow(select));
}

/** Target, case, series and search that are on the screen now. */
export function useBench(): BenchSelection {
  const document = useDocument((state) => state.document);
  const view = useView(({ targetId, caseId, trial, aliasPeriodDays }) => ({
    targetId,
    caseId,
    trial,
    aliasPeriodDays,
  }));
  const results = useResults((state) => state);
  return useMemo(() => selectBench(document, view, results), [document, view, results]);
}
