import { useStore } from 'zustand';
import { shownDocument } from '../table-store';
import { useTable } from '../table-context';
import { fitKey, type FitService, type FitState } from './fit-service';

/** The fit's state, and whether it is for the floor that is shown. */
export function useFit(fit: FitService): FitState & { readonly current: boolean } {
  const state = useStore(fit.state);
  const key = useTable((now) => fitKey(shownDocument(now), now.hold));
  return { ...state, current: state.key === key };
}
