import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '../ui/Button';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import { layout, space } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { methodsOf, methodsText } from './methods';

/** A paragraph for the paper, with its references, to copy. */
export function MethodsPanel({ fit, name }: { fit: DoneFit; name: string }) {
  const methods = methodsOf(fit, name);
  const [copied, setCopied] = useState<'yes' | 'no' | null>(null);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(methodsText(methods));
      setCopied('yes');
    } catch {
      setCopied('no'); // not allowed here: it can still be marked and copied by hand
    }
  };
  return (
    <Panel
      title="For the methods section"
      aside={
        <Button
          icon={copied === 'yes' ? 'check' : undefined}
          label={copied === 'yes' ? 'Copied' : 'Copy'}
          onPress={() => void copy()}
        />
      }
    >
      <Text selectable style={{ maxWidth: layout.readable }}>
        {methods.paragraph}
      </Text>
      <View role="list" aria-label="References" style={{ gap: space(0.5) }}>
        {methods.references.map((work) => (
          <View key={work} role="listitem">
            <Text size="small" tone="quiet" selectable>
              {work}
            </Text>
          </View>
        ))}
      </View>
      {copied === 'no' && (
        <Text size="small" tone="person" role="status">
          The browser did not allow copying. Select the text and copy it by hand.
        </Text>
      )}
    </Panel>
  );
}
