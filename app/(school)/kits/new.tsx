export { NewKitScreen as default } from '@/components/catalogue/NewKitScreen';
