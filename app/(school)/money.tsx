export { MoneyScreen as default } from '@/components/deposits/MoneyScreen';
