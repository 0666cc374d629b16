export { StartScreen as default } from '@/components/session/StartScreen';
