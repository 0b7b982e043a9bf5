import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { CheckBox } from '@/components/ui/CheckBox';
import { Field } from '@/components/ui/Field';
import { count } from '@/components/ui/format';
import { SectionTitle } from '@/components/ui/Panel';
import { space } from '@/components/ui/tokens';

/** The one value that all share; null where they differ. */
const common = <T,>(values: readonly T[]): T | null =>
  values.every((value) => value === values[0]) ? (values[0] ?? null) : null;

const MOST_SIGMA = 90;
const LONGEST_NOTE = 500;

/** Error, confidence and note of the selected marks: of one, or of all that a lasso holds. */
export function MarkDetails() {
  const { axes, chosen, canMark, describeMarks, usualSigma } = useSession();
  const ids = chosen.map((mark) => mark.id);
  const who = ids.join();
  const sigma = common(chosen.map((mark) => mark.sigma ?? null));
  const note = common(chosen.map((mark) => mark.note ?? ''));
  const [sigmaText, setSigmaText] = useState('');
  const [noteText, setNoteText] = useState('');
  useEffect(() => setSigmaText(sigma === null ? '' : String(sigma)), [who, sigma]);
  useEffect(() => setNoteText(note ?? ''), [who, note]);
  if (!canMark || ids.length === 0) return null;
  const unsure = chosen.every((mark) => mark.unsure);
  const wrong = sigmaText.trim() !== '' && readSigma(sigmaText) === undefined;
  const keepSigma = () => {
    const read = readSigma(sigmaText);
    if (sigmaText.trim() === '' && sigma === null) return; // several errors: an empty field says nothing
    if (read !== undefined || sigmaText.trim() === '') describeMarks(ids, { sigma: read ?? null });
  };
  const keepNote = () => {
    if (noteText.trim() !== (note ?? '')) describeMarks(ids, { note: noteText });
  };
  return (
    <View role="group" aria-label="Selected marks" testID="mark-details" style={{ gap: space(2) }}>
      <SectionTitle>{ids.length === 1 ? 'Selected mark' : count(ids.length, 'selected mark')}</SectionTitle>
      <CheckBox
        showLabel
        label="Unsure"
        checked={unsure}
        onChange={() => describeMarks(ids, { unsure: !unsure })}
      />
      <Field
        mono
        label="Position error"
        unit="°"
        inputMode="decimal"
        value={sigmaText}
        placeholder={sigma === null && ids.length > 1 ? 'several' : 'from the scatter'}
        onChangeText={setSigmaText}
        onBlur={keepSigma}
        onSubmitEditing={keepSigma}
        problem={wrong ? `A number of degrees above 0, at most ${MOST_SIGMA}.` : null}
        hint={
          axes.beam
            ? `Half the beam is ${usualSigma}°.`
            : `The header names no beam; half of three pixels is ${usualSigma}°.`
        }
      />
      <Field
        label="Note"
        value={noteText}
        maxLength={LONGEST_NOTE}
        placeholder={note === null ? 'several' : undefined}
        onChangeText={setNoteText}
        onBlur={keepNote}
        onSubmitEditing={keepNote}
      />
      {sigma !== usualSigma && (
        <Button
          kind="quiet"
          label={axes.beam ? 'Take half the beam' : 'Take half of three pixels'}
          onPress={() => describeMarks(ids, { sigma: usualSigma })}
        />
      )}
    </View>
  );
}

function readSigma(text: string): number | undefined {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && value > 0 && value <= MOST_SIGMA ? value : undefined;
}
