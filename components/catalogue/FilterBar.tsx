import { useEffect, useState } from 'react';
import { View } from 'react-native';
import type { Region } from '@/shared/contract/regions';
import { Button } from '../ui/Button';
import { ToggleChip } from '../ui/Chip';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { count } from '../ui/format';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { SHELL_STATUS } from '@/shared/contract/words';
import { narrowing, RANGES, toggled, type Filters } from './filters';

/** Search and filters of the catalogue; each change goes into the address. */
export function FilterBar({
  filters,
  regions,
  onChange,
}: {
  filters: Filters;
  regions: readonly Region[];
  onChange: (filters: Filters) => void;
}) {
  const [open, setOpen] = useState(false);
  const active = narrowing(filters);
  const none: Filters = {
    ...filters,
    region: [],
    status: [],
    search: '',
    vExpMin: '',
    vExpMax: '',
    radiusMin: '',
    radiusMax: '',
  };
  return (
    <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), alignItems: 'center' }}>
      <View style={{ flexGrow: 1, flexBasis: space(50), maxWidth: space(90) }}>
        <Typed
          label="Find a shell"
          placeholder="Find by name or designation"
          value={filters.search}
          onChange={(search) => onChange({ ...filters, search })}
        />
      </View>
      <Button
        icon="filter"
        label={active > 0 ? `Filters, ${active}` : 'Filters'}
        aria-label={active > 0 ? `Filters, ${count(active, 'filter')} set` : 'Filters'}
        onPress={() => setOpen(true)}
      />
      {active > 0 && <Button kind="quiet" icon="close" label="Clear" onPress={() => onChange(none)} />}
      {open && (
        <Dialog
          title="Filters"
          onClose={() => setOpen(false)}
          actions={
            <>
              <Button label="Clear" onPress={() => onChange(none)} disabled={active === 0} />
              <Button kind="primary" label="Done" onPress={() => setOpen(false)} />
            </>
          }
        >
          <Choice title="Region">
            {regions.map((r) => (
              <ToggleChip
                key={r.id}
                role="checkbox"
                label={r.name}
                selected={filters.region.includes(r.id)}
                onPress={() => onChange({ ...filters, region: toggled(filters.region, r.id) })}
              />
            ))}
          </Choice>
          <Choice title="Status">
            {SHELL_STATUS.map((s) => (
              <ToggleChip
                key={s}
                role="checkbox"
                label={s}
                selected={filters.status.includes(s)}
                onPress={() => onChange({ ...filters, status: toggled(filters.status, s) })}
              />
            ))}
          </Choice>
          <Range
            title="Expansion velocity, km/s"
            low="vExpMin"
            high="vExpMax"
            filters={filters}
            onChange={onChange}
          />
          <Range title="Radius, pc" low="radiusMin" high="radiusMax" filters={filters} onChange={onChange} />
        </Dialog>
      )}
    </View>
  );
}

function Choice({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <View role="group" aria-label={title} style={{ gap: space(1) }}>
      <Text size="small" tone="quiet" weight="semibold">
        {title}
      </Text>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(2) }}>{children}</View>
    </View>
  );
}

type RangeKey = (typeof RANGES)[number];
function Range({
  title,
  low,
  high,
  filters,
  onChange,
}: {
  title: string;
  low: RangeKey;
  high: RangeKey;
  filters: Filters;
  onChange: (f: Filters) => void;
}) {
  const [a, b] = [filters[low], filters[high]].map(Number);
  const crossed = filters[low] && filters[high] && a! > b! ? 'The lower end is above the upper one.' : null;
  return (
    <View role="group" aria-label={title} style={{ flexDirection: 'row', gap: space(3) }}>
      <View style={{ flex: 1 }}>
        <Typed
          numeric
          showLabel
          label={`${title}, from`}
          value={filters[low]}
          problem={crossed}
          onChange={(v) => onChange({ ...filters, [low]: v })}
        />
      </View>
      <View style={{ flex: 1 }}>
        <Typed
          numeric
          showLabel
          label="to"
          value={filters[high]}
          onChange={(v) => onChange({ ...filters, [high]: v })}
        />
      </View>
    </View>
  );
}

/** Holds what is typed and hands it on a moment later, so that the address does not change with every letter. */
function Typed({
  label,
  value,
  onChange,
  placeholder,
  numeric,
  showLabel,
  problem,
}: {
  label: string;
  value: string;
  onChange: (value: string) => void;
  placeholder?: string;
  numeric?: boolean;
  showLabel?: boolean;
  problem?: string | null;
}) {
  const [text, setText] = useState(value);
  const [seen, setSeen] = useState(value);
  if (value !== seen) {
    // the address changed by itself: a link, the back button, Clear
    setSeen(value);
    setText(value);
  }
  const bad = numeric && text.trim() !== '' && !Number.isFinite(Number(text)) ? 'A number.' : null;
  useEffect(() => {
    if (text === value || bad) return;
    const timer = setTimeout(() => {
      setSeen(text);
      onChange(text);
    }, 300);
    return () => clearTimeout(timer);
  }, [text, value, bad, onChange]);
  return (
    <Field
      label={label}
      hideLabel={!showLabel}
      placeholder={placeholder}
      value={text}
      maxLength={80}
      mono={numeric}
      inputMode={numeric ? 'decimal' : 'search'}
      onChangeText={setText}
      problem={bad ?? problem}
    />
  );
}
