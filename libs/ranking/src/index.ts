export { InvalidScoreSheet, sheetFromTable, type ScoreSheet, type SheetScore } from './score-sheet.js';
export { meanOf, sampleStandardDeviation, summariseScores, type ScoreSummary } from './statistics.js';
export { rankByMean, rankDescending, type RankedProposal, type TieRule } from './ranks.js';
export { criteriaScore, type CriteriaScore, type CriterionAnswer, type CriterionWeight } from './criteria-score.js';
export {
  overlapCorrection,
  reviewerLeniency,
  standardiseScores,
  type OverlapCorrection,
  type ReviewerLeniency,
  type SpreadlessRule,
  type Standardised,
} from './leniency.js';
export { connectedComponents, fitAdditiveModel, type AdditiveModel, type ScoreComponent } from './additive-model.js';
export { bordaCount, type BordaCount } from './borda.js';
export { kendallTauB, kendallW, spearmanRho } from './agreement.js';
export {
  cutLine,
  moonClasses,
  type CutLine,
  type CutLineInput,
  type CutLineRow,
  type HoursByMoonClass,
  type MoonClass,
} from './cut-line.js';
