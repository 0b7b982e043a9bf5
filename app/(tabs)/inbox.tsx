export { InboxPage as default } from '@/components/inbox/InboxPage';
