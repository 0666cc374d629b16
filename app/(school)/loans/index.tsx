export { MyLoansScreen as default } from '@/components/lending/MyLoansScreen';
