export * from './loanStates';
export * from './dueTime';
export * from './deposit';
export * from './stoneEndings';
