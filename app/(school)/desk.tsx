export { DeskScreen as default } from '@/components/desk/DeskScreen';
