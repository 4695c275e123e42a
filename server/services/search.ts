import { repositories } from '../repositories/index';
import type { SearchRow } from '../repositories/search';
import type { Context } from './context';

export interface SearchItem {
  kind: SearchRow['kind'];
  label: string;
  /** Path in the application. */
  to: string;
}

const paths = { plan: 'plans', target: 'targets', release: 'releases', replay: 'replays' } as const;

const mostOfEachKind = 8;

const toItem = ({ kind, key, label }: SearchRow): SearchItem => ({ kind, label, to: `/${paths[kind]}/${key}` });

export function searchService({ db }: Context) {
  return {
    /** Things whose names hold the text; nothing for an empty one. The database passes over control characters. */
    async find(text: string): Promise<SearchItem[]> {
      const trimmed = text
        .replace(/\p{Cc}/gu, '')
        .trim()
        .slice(0, 100);
      return trimmed === '' ? [] : (await repositories(db).search.find(trimmed, mostOfEachKind)).map(toItem);
    },
  };
}

export type SearchService = ReturnType<typeof searchService>;
