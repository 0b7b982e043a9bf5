import { useLocalSearchParams } from 'expo-router';
import { SignIn } from '@/components/frame/SignIn';

export default function SignInScreen() {
  const { to, problem } = useLocalSearchParams<{ to?: string; problem?: string }>();
  return <SignIn to={to} problem={problem} />;
}
