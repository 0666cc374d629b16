export * from './money';
export * from './postings';
export * from './balances';
export * from './words';
