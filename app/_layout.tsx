export { AppRoot as default } from '@/components/shell/AppRoot';
