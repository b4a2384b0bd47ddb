/** The trade's rules. These names are kept stable; see DEVELOPERS.md. */
export { binomialTail } from './statistics/binomial-tail';
export { expectedFalsePositives } from './statistics/expected-false-positives';
export { fisherExact } from './statistics/fisher-exact';
export { wilson } from './statistics/wilson';
export { holm } from './statistics/holm';
export { benjaminiHochberg } from './statistics/benjamini-hochberg';
export { verdict, DEFAULT_RULE, type Rule, type SiteVerdict, type Verdict } from './verdict';
export { effect, type Scored } from './effect';
export { combined, stillOpen, type CombinedRow } from './combined';
export { fold } from './fold';
export {
	emptyCase,
	type CaseState,
	type ExclusionReason,
	type Row,
	type Run,
	type Tag,
	type Trial
} from './case-state';
export { sites, tagResults, compareTags, repeatedPresentations, type SiteRow, type TagResult } from './sites';
export { controlRates, isControl, type ControlRate } from './controls';
export { caseItems, preparedTasks, type KeptItem } from './case-items';
export { nextItem, stayingItem, type Offer } from './offer';
export { shuffle } from './shuffle';
export { DEFAULT_PROTOCOL, type Protocol } from './protocol';
export * from './events';
export * from './vocabulary';
