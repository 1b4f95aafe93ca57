import '@fontsource-variable/atkinson-hyperlegible-next/wght.css';
import 'uplot/dist/uPlot.min.css';
import './board.css';
import { mount } from 'svelte';
import App from './App.svelte';
import { Board } from './state/board.svelte.ts';
import { Picture } from './state/picture.svelte.ts';
import { Preferences } from './state/preferences.svelte.ts';
import { applyTheme } from './state/theme.ts';
import { connectWorker } from './worker/connect.ts';

const preferences = new Preferences(browserStorage());
// Before the first paint, so that nothing flashes.
applyTheme(preferences.theme);
const board = new Board(connectWorker(), preferences);
const target = document.getElementById('board');
if (target !== null) mount(App, { target, props: { board, picture: new Picture(board) } });

/** A browser may refuse storage altogether; then nothing is remembered. */
function browserStorage(): Storage | undefined {
  try {
    return localStorage;
  } catch {
    return undefined;
  }
}
