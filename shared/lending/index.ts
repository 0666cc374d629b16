export * from './loanStates';
export * from './dueTime';
export * from './deposit';
export * from './depositWords';
export * from './holdPlan';
export * from './stoneEndings';
