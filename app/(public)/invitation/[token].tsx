export { InvitationScreen as default } from '@/components/session/InvitationScreen';
