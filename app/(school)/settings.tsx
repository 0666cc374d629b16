export { SettingsScreen as default } from '@/components/school/SettingsScreen';
