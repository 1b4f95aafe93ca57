export { CRITERIA, CRITERIA_NAMES, criteriaOf, hasCategories, type Criteria, type CriteriaName } from './criteria.ts';
export { findJets, type FindOptions, type Jet, type JetFinding, type SmoothNose } from './find-jets.ts';
export type { JetCore } from './layer.ts';
export { NO_JET, NOT_ASSESSABLE, scanNoses, type NoseTable } from './scan.ts';
export { rateOf, type Phase, type Rate } from './rates.ts';
export { trackJets, type JetTrack, type TimedFinding, type TrackOptions, type TrackPoint } from './track.ts';
export { completeUncertainty, type UncertaintyOrigin } from './uncertainty.ts';
export {
  fitOscillation,
  greatestSpeed,
  oscillatingWind,
  type FittedOscillation,
  type Oscillation,
} from './oscillation.ts';
export { jetLayer, type Disc, type JetFlank, type JetLayer, type NosePlace } from './jet-layer.ts';
export { thermalTurn, type ThermalTurn } from './thermal-turn.ts';
export { turningAt, type Turning, type TurningOptions, type TurningVerdict } from './turning.ts';
export { JET_KINDS, type Evidence, type JetKind } from './evidence.ts';
export { type KindFinding } from './kinds.ts';
export { storyOf, type JetStory, type StorySetting } from './story.ts';
export { type WordFormat } from './story-words.ts';
