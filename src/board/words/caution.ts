/** The standing caution: the same words on every page, sheet and print. */
export const CAUTION =
  'An aid to judgement. Official warnings come from the national weather service; lifting, climbing and switching ' +
  'follow site rules, the maker’s limits and licensed practice. Not for air navigation.';

/** Beside what could be taken for a forecast of storms. */
export const STORM_CAUTION =
  'Ingredients, not a forecast: no index is made of them. Official warnings come from the national weather service.';
