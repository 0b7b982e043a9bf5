import { useRef, useState } from 'react';
import { Modal, View } from 'react-native';
import { Backdrop } from './Backdrop';
import { Button, IconButton } from './Button';
import { Icon, type IconName } from './Icon';
import { Press, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch } from './tokens';
import { useWide } from './useWide';

export interface MenuItem {
  label: string;
  icon?: IconName;
  danger?: boolean;
  disabled?: boolean;
  selected?: boolean;
  perform: () => void;
}

/** Actions on one thing behind one button; arrow keys move, Escape closes. */
export function Menu({
  label,
  items,
  icon = 'more',
  text,
}: {
  label: string;
  items: readonly MenuItem[];
  icon?: IconName;
  text?: boolean;
}) {
  const { color } = useTheme();
  const { width, height } = useWide();
  const anchor = useRef<View>(null);
  const [at, setAt] = useState<{ x: number; y: number } | null>(null);
  const [wide, tall] = [space(56), items.length * touch + space(2)];

  const open = () =>
    anchor.current?.measureInWindow((x, y, w, h) =>
      setAt({
        x: Math.max(space(2), Math.min(x + w - wide, width - wide - space(2))),
        y: y + h + tall > height ? Math.max(space(2), y - tall) : y + h,
      }),
    );
  const keys = {
    onKeyDown: (e: { key: string; preventDefault(): void; currentTarget: unknown }) => {
      const by = e.key === 'ArrowDown' ? 1 : e.key === 'ArrowUp' ? -1 : 0;
      if (by === 0) return;
      e.preventDefault();
      const all = Array.from(
        (e.currentTarget as HTMLElement).querySelectorAll<HTMLElement>('[role="menuitem"]'),
      );
      const now = all.indexOf(document.activeElement as HTMLElement);
      all[(now + by + all.length) % all.length]?.focus();
    },
  } as object;
  const button = { 'aria-label': label, 'aria-haspopup': 'menu', 'aria-expanded': at !== null } as object;
  return (
    <View ref={anchor} collapsable={false} style={{ alignSelf: 'center' }}>
      {text ? (
        <Button label={label} icon={icon} {...button} onPress={open} />
      ) : (
        <IconButton icon={icon} label={label} {...button} onPress={open} />
      )}
      {at && (
        <Modal
          transparent
          visible
          onRequestClose={() => setAt(null)}
          {...({ 'aria-label': label } as object)}
        >
          <View
            role="menu"
            aria-label={label}
            {...keys}
            style={{
              position: 'absolute',
              left: at.x,
              top: at.y,
              width: wide,
              paddingVertical: space(1),
              borderRadius: radius.large,
              borderWidth: hairline,
              borderColor: color.control,
              backgroundColor: color.raised,
              boxShadow: `0 ${space(1)}px ${space(5)}px ${color.shadow}`,
            }}
          >
            {items.map((item) => (
              <Press
                key={item.label}
                role="menuitem"
                aria-label={item.label}
                disabled={item.disabled}
                onPress={() => {
                  setAt(null);
                  item.perform();
                }}
                style={({ hovered }: PressState) => ({
                  minHeight: touch,
                  flexDirection: 'row',
                  alignItems: 'center',
                  gap: space(3),
                  paddingHorizontal: space(4),
                  backgroundColor: hovered ? color.chip : 'transparent',
                  opacity: item.disabled ? 0.5 : 1,
                })}
              >
                {item.icon && <Icon name={item.icon} size={18} tone={item.danger ? 'error' : 'quiet'} />}
                <Text tone={item.danger ? 'error' : 'text'} style={{ flex: 1 }}>
                  {item.label}
                </Text>
                {item.selected && <Icon name="check" size={16} />}
              </Press>
            ))}
          </View>
          <Backdrop onPress={() => setAt(null)} />
        </Modal>
      )}
    </View>
  );
}
