import { api } from './client';

export interface Hit {
  kind: 'plan' | 'target' | 'release' | 'replay';
  label: string;
  /** Path of the page. */
  to: string;
}

export const search = async (text: string, signal: AbortSignal): Promise<Hit[]> =>
  (await api.get<{ items: Hit[] }>(`/search?q=${encodeURIComponent(text)}`, { signal })).items;
