export { DEFAULT_SETTINGS, ENGINE_VERSION, GROUP_OF } from './settings';
export type { EngineSettings, EvidenceGroup } from './settings';
export { computeVerdict } from './verdict';
export type { VerdictOptions } from './verdict';
export { estimateRecord } from './estimate';
export type { Estimate } from './estimate';
export { recordGaps } from './gaps';
export { MAX_READINGS, validateRecordedStone, validateVerdictRequest } from './validate';
export { conformanceProbability, enScore, supportOf, twoLevelLR, zetaScore } from './scores';
