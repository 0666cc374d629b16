export { NewStoneScreen as default } from '@/components/catalogue/NewStoneScreen';
