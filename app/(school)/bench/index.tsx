export { BenchListScreen as default } from '@/components/bench/BenchListScreen';
