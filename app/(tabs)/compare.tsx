export { ComparePage as default } from '@/components/compare/ComparePage';
