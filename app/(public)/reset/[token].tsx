export { ResetScreen as default } from '@/components/session/ResetScreen';
