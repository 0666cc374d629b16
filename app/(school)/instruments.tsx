export { InstrumentsScreen as default } from '@/components/instruments/InstrumentsScreen';
