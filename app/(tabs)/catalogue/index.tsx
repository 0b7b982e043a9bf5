export { CataloguePage as default } from '@/components/catalogue/CataloguePage';
