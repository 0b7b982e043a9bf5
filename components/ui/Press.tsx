import { useRouter, type Href } from 'expo-router';
import type { ReactNode } from 'react';
import { Pressable, type GestureResponderEvent, type PressableProps, type ViewStyle } from 'react-native';

export interface PressState {
  pressed: boolean;
  hovered: boolean;
  focused: boolean;
}
export interface PressProps extends Omit<PressableProps, 'style' | 'children'> {
  /** Makes it a link: it can be opened in another tab, and its address is shown. */
  href?: Href;
  /** Replaces the present entry of the history. */
  replace?: boolean;
  /** Full page navigation, for addresses outside the app (sign-in, downloads). */
  external?: boolean;
  download?: string;
  style?: ViewStyle | ((state: PressState) => ViewStyle | (ViewStyle | false | undefined)[]);
  children?: ReactNode | ((state: PressState) => ReactNode);
}

/** What can be pressed: a button, or a link where it has an address. */
export function Press({ href, ...props }: PressProps) {
  return href === undefined ? <PressButton {...props} /> : <PressLink href={href} {...props} />;
}

function PressButton({ style, children, replace: _r, external: _e, download: _d, ...rest }: PressProps) {
  return (
    <Pressable role="button" {...rest} style={style as PressableProps['style']}>
      {children as PressableProps['children']}
    </Pressable>
  );
}

function PressLink({
  href,
  replace,
  external,
  download,
  onPress,
  style,
  children,
  ...rest
}: PressProps & { href: Href }) {
  const router = useRouter();
  const address = typeof href === 'string' ? href : href.pathname;
  const follow = (event: GestureResponderEvent) => {
    onPress?.(event);
    const e = event as unknown as MouseEvent;
    if (external || e.defaultPrevented || e.metaKey || e.ctrlKey || e.shiftKey || e.button > 0) return;
    e.preventDefault?.();
    if (replace) router.replace(href);
    else router.push(href);
  };
  const anchor = { href: address, ...(download !== undefined && { hrefAttrs: { download } }) };
  return (
    <Pressable role="link" {...rest} {...anchor} onPress={follow} style={style as PressableProps['style']}>
      {children as PressableProps['children']}
    </Pressable>
  );
}
