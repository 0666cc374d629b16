export { KitScreen as default } from '@/components/catalogue/KitScreen';
