export { LabelsScreen as default } from '@/components/labels/LabelsScreen';
