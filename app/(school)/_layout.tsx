export { SchoolLayout as default } from '@/components/shell/layouts';
