import type { ReactNode } from 'react';
import { Modal, ScrollView, View } from 'react-native';
import { Backdrop } from './Backdrop';
import { IconButton } from './Button';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, inset, layout, radius, space } from './tokens';
import { useWide } from './useWide';

export interface DialogProps {
  title: string;
  onClose: () => void;
  children: ReactNode;
  /** Buttons at the foot. */
  actions?: ReactNode;
  width?: number;
}

/** A question in front of the page: focus stays in it, Escape and the ground behind close it. Phone: from below. */
export function Dialog({ title, onClose, children, actions, width = layout.dialog }: DialogProps) {
  const { color } = useTheme();
  const { wide, height } = useWide();
  const name = { 'aria-label': title } as object;
  return (
    <Modal transparent visible onRequestClose={onClose} {...name}>
      <View
        style={{
          flex: 1,
          alignItems: 'center',
          justifyContent: wide ? 'center' : 'flex-end',
          backgroundColor: color.scrim,
          padding: wide ? space(6) : 0,
        }}
      >
        <View
          style={{
            width: '100%',
            maxWidth: wide ? width : undefined,
            maxHeight: height * 0.92,
            paddingBottom: wide ? 0 : inset('bottom'),
            backgroundColor: color.panel,
            borderColor: color.line,
            borderWidth: hairline,
            borderTopLeftRadius: radius.large,
            borderTopRightRadius: radius.large,
            borderBottomLeftRadius: wide ? radius.large : 0,
            borderBottomRightRadius: wide ? radius.large : 0,
          }}
        >
          <View
            style={{
              flexDirection: 'row',
              alignItems: 'center',
              paddingLeft: space(4),
              paddingRight: space(1),
              paddingTop: space(1),
            }}
          >
            <Text heading={2} size="title" weight="bold" style={{ flex: 1 }}>
              {title}
            </Text>
            <IconButton icon="close" label="Close" onPress={onClose} />
          </View>
          <ScrollView contentContainerStyle={{ padding: space(4), gap: space(4) }}>{children}</ScrollView>
          {actions && (
            <View
              style={{
                flexDirection: 'row',
                justifyContent: 'flex-end',
                flexWrap: 'wrap',
                gap: space(2),
                padding: space(4),
                borderTopWidth: hairline,
                borderTopColor: color.line,
              }}
            >
              {actions}
            </View>
          )}
        </View>
        <Backdrop onPress={onClose} />
      </View>
    </Modal>
  );
}
