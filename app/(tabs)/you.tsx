export { YouPage as default } from '@/components/you/YouPage';
