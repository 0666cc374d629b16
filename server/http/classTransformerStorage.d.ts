/** class-transformer publishes its storage without types for the path that CommonJS can load. */
declare module 'class-transformer/cjs/storage' {
  export { defaultMetadataStorage } from 'class-transformer/types/storage';
}
