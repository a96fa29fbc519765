export type { Finding, Level, Occurrence, Way } from './finding.js';
export { ROLES, roleOf, type Role } from './roles.js';
export {
  NO_HOUSE_RULES,
  roleIn,
  type Address,
  type Declared,
  type DeclaredSpan,
  type Exception,
  type HouseRules,
  type LevelSetting,
  type LimitSetting,
  type LimitTable,
  type Where,
} from './house-rules.js';
export { parseHouseRules } from './parse-house-rules.js';
export type {
  DeclaredHere,
  Family,
  Limits,
  Place,
  PlayedTrack,
  Remedy,
  RoleLimits,
  Rule,
  RulePage,
  TrackContext,
} from './rule.js';
export { RULES } from './registry.js';
export { COMPARISON_RULES, type ComparisonRule } from './comparison-rule.js';
export { allowedSpeed } from './allowed-speed.js';
export { withDeclaredCuts } from './declared-cuts.js';
export { surveyClip, surveyTrack, type SurveySettings, type TrackSurveySettings } from './survey.js';
export { eventAt, gatherEvents, type Gathered, type SurveyEvent } from './events.js';
export { guessLoop, type LoopGuess } from './loop-guess.js';
export { explainWord, wordBook, type Entry, type Explanation } from './explain.js';
export { rulePage } from './rule-page.js';
export { fnv1a64 } from './fingerprint.js';
export { significant } from './significant.js';
export { plainWord, wordsFor, type Word } from './word.js';
