/** The standing caution: the same words on every page, sheet and print. */
export const CAUTION =
  'An aid to judgement. Official warnings come from the national weather service; lifting, climbing and switching ' +
  'follow site rules, the maker’s limits and licensed practice. Not for air navigation.';
