export { screen, SCREENS, type Screen, type ScreenContext, type ScreenName, type ScreenReport } from './screen.ts';
export { type FeedScreening } from './tally.ts';
