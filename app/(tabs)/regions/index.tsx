export { RegionList as default } from '@/components/regions/RegionList';
