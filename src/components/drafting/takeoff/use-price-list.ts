import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { LayoutPrices, LayoutPriceSet } from '@/api-types/layout-prices';
import type { PriceList } from '@/takeoff/price-list';
import { api, type ApiError } from '../../ui/api';
import { useLayoutId } from '../table-context';

const keyOf = (layoutId: string | null) => ['price-list', layoutId];

/** What the layout on the table is priced with: the firm's catalogue of today and what was typed for the layout. */
export function usePriceList() {
  const layoutId = useLayoutId();
  return useQuery({
    queryKey: keyOf(layoutId),
    queryFn: () => api<PriceList>('GET', `/api/layouts/${layoutId}/price-list`),
    enabled: layoutId !== null,
    staleTime: 60_000,
    retry: false,
  });
}

/** Keeps a typed price of an order, or with null takes it away. It is the firm's own, beside the document: no undo step. */
export function usePriceSetting() {
  const layoutId = useLayoutId();
  const queries = useQueryClient();
  return useMutation<LayoutPrices, ApiError, LayoutPriceSet>({
    networkMode: 'always',
    mutationFn: (set) => api('PUT', `/api/layouts/${layoutId}/price-list`, set),
    onSuccess: ({ typed }) =>
      queries.setQueryData<PriceList>(keyOf(layoutId), (list) => list && { ...list, typed }),
  });
}
