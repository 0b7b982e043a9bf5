// Native and test fallback; the web build takes Select.web.tsx.
import { SegmentedChoice, type ChoiceProps } from './SegmentedChoice';

export function Select<T extends string>(props: ChoiceProps<T>) {
  return <SegmentedChoice {...props} />;
}
