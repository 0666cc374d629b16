export { PublicLayout as default } from '@/components/shell/layouts';
