export { ScanScreen as default } from '@/components/scan/ScanScreen';
