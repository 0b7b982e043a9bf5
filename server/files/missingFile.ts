import { Problem } from '@/shared/contract/problem';

export const missingFile = (key: string) =>
  new Problem('not-found', 'The file of this cube is not in the store any more. Upload it again.', { key });
