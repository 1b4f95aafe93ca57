// The pages of the house, in the order of the head line.

import type { Component } from 'svelte';
import type { Board } from '../state/board.svelte.ts';
import type { Picture } from '../state/picture.svelte.ts';
import type { TimeWords } from '../words/time.ts';
import Feeds from './Feeds.svelte';
import Rotor from './Rotor.svelte';
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
  readonly component: Component<PageProps>;
}

export const PAGES: readonly Page[] = [
  { path: 'tonight', title: 'Tonight', component: Tonight },
  { path: 'rotor', title: 'Rotor', component: Rotor },
  { path: 'feeds', title: 'Feeds', component: Feeds },
];
