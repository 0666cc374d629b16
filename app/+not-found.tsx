export { NotFoundScreen as default } from '@/components/session/NotFoundScreen';
