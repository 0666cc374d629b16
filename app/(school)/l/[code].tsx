export { LabelLinkScreen as default } from '@/components/scan/LabelLinkScreen';
