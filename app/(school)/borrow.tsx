export { BorrowScreen as default } from '@/components/lending/BorrowScreen';
