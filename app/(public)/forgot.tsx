export { ForgotScreen as default } from '@/components/session/ForgotScreen';
