// The pages of the house, in the order of the head line.

import type { Component } from 'svelte';
import type { Board } from '../state/board.svelte.ts';
import type { Picture } from '../state/picture.svelte.ts';
import type { TimeWords } from '../words/time.ts';
import Tonight from './Tonight.svelte';

export interface PageProps {
  board: Board;
  picture: Picture;
  times: TimeWords;
}

export interface Page {
  /** The part of the address behind `#/`. */
  readonly path: string;
  readonly title: string;
  /** Called when the page is first opened: Tonight comes with the first load, the others when somebody asks. */
  readonly load: () => Promise<{ default: Component<PageProps> }>;
}

export const PAGES: readonly Page[] = [
  { path: 'tonight', title: 'Tonight', load: () => Promise.resolve({ default: Tonight }) },
  { path: 'rotor', title: 'Rotor', load: () => import('./Rotor.svelte') },
  { path: 'moisture', title: 'Moisture', load: () => import('./Moisture.svelte') },
  { path: 'inflow', title: 'Inflow', load: () => import('./Inflow.svelte') },
  { path: 'nights', title: 'Nights', load: () => import('./Nights.svelte') },
  { path: 'feeds', title: 'Feeds', load: () => import('./Feeds.svelte') },
];
