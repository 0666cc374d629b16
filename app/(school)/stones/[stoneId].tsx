export { StoneScreen as default } from '@/components/catalogue/StoneScreen';
