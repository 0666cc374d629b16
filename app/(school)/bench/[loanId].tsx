export { BenchCheckScreen as default } from '@/components/bench/BenchCheckScreen';
