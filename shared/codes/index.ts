export * from './labelCode';
