export { KitsScreen as default } from '@/components/catalogue/KitsScreen';
