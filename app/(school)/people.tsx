export { PeopleScreen as default } from '@/components/people/PeopleScreen';
