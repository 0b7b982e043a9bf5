import { useSession } from '@/components/cube/session';
import { VIEWS } from '@/components/cube/views';
import { MAPS } from '@/components/seeing/seeing';
import { Select } from '@/components/ui/Select';
import { breakpoints } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';

/** What the second map shows; offered where there is room for one. */
export function SecondChoice() {
  const { seeing } = useSession();
  const { width } = useWide();
  if (width < breakpoints.roomy) return null;
  const { other, second, change } = seeing;
  return (
    <Select
      label="Second map"
      value={second ?? 'none'}
      options={[
        { value: 'none', label: 'none' },
        ...MAPS.map((kind) => ({ value: kind, label: VIEWS[kind].long })),
        {
          value: 'other',
          label:
            typeof other === 'number' ? `Channel ${other + 1}, compared with` : 'The channel compared with',
          disabled: typeof other !== 'number',
        },
      ]}
      onChange={(to) => change({ second: to === 'none' ? null : to })}
    />
  );
}
