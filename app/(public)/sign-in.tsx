export { SignInScreen as default } from '@/components/session/SignInScreen';
