import { modelNames } from '@/components/fit/fitFacts';
import { useSession } from '@/components/cube/session';
import type { LayerName } from '@/components/seeing/seeing';
import { CheckBox } from '@/components/ui/CheckBox';
import { ago } from '@/components/ui/format';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';

/** What else lies over the map: the traced rim, other shells, marks that fits of this shell froze. */
export function LayerSection() {
  const { seeing, layers, shell } = useSession();
  const { fits, trace, heldBack } = layers;
  const box = (name: LayerName, label: string, disabled = false) => (
    <CheckBox
      showLabel
      label={label}
      disabled={disabled}
      checked={seeing.layers.includes(name) && !disabled}
      onChange={(on) =>
        seeing.change({ layers: [...seeing.layers.filter((n) => n !== name), ...(on ? [name] : [])] })
      }
    />
  );
  return (
    <>
      {box('shells', 'Other shells')}
      {shell && box('traced', trace ? 'Traced rim' : 'Traced rim (none yet)', trace === null)}
      {shell && fits.length > 0 && (
        <Select
          label="Marks of a fit"
          value={seeing.marksOf ?? 'none'}
          options={[
            { value: 'none', label: 'none' },
            ...fits.map((fit) => ({
              value: fit.id,
              label: [fit.createdBy?.name, modelNames[fit.model], ago(fit.createdAt)]
                .filter(Boolean)
                .join(', '),
            })),
          ]}
          onChange={(id) => seeing.change({ marksOf: id === 'none' ? null : id })}
        />
      )}
      {heldBack && (
        <Text size="small" tone="quiet">
          What others marked of this shell is shown once a fit of your own marks is done, so that your reading
          is yours.
        </Text>
      )}
    </>
  );
}
