export { ReturnScreen as default } from '@/components/lending/ReturnScreen';
