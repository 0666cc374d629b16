export { LoanScreen as default } from '@/components/lending/LoanScreen';
