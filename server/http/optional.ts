/** `IfSent` under the name some features know it by. */
export { IfSent as Optional } from './decorators';
