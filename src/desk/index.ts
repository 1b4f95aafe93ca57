export { Desk, type DiscSeries, type FeedState, type NightQuestion, type NightState } from './desk.ts';
export type { Acceptance, FeedName } from './feed-store.ts';
export type { NightWindow } from './night-window.ts';
