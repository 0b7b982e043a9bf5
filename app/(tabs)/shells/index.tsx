export { ShellsTab as default } from '@/components/shells/ShellsTab';
