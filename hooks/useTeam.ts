import { useSWRConfig } from 'swr';
import type { Role } from '@/shared/contract/permissions';
import type { Member, NewToken, Token } from '@/shared/contract/people';
import { api } from './api';
import { keys } from './keys';
import { useRead, type List } from './useRead';

export const useMembers = () => useRead<List<Member>>(keys.members());
export const useTokens = () => useRead<List<Token>>(keys.tokens());

export function useTeamActions() {
  const { mutate } = useSWRConfig();
  const refresh = () => {
    void mutate(keys.members());
    void mutate(keys.me());
  };
  return {
    async add(login: string, role: Role) {
      await api<Member>(keys.members(), { method: 'POST', body: { login, role } });
      refresh();
    },
    async setRole(personId: string, role: Role) {
      await api<Member>(`${keys.members()}/${personId}`, { method: 'PATCH', body: { role } });
      refresh();
    },
    async remove(personId: string) {
      await api(`${keys.members()}/${personId}`, { method: 'DELETE' });
      refresh();
    },
  };
}

export function useTokenActions() {
  const { mutate } = useSWRConfig();
  return {
    async make(name: string): Promise<NewToken> {
      const token = await api<NewToken>(keys.tokens(), { method: 'POST', body: { name } });
      void mutate(keys.tokens());
      return token;
    },
    async revoke(id: string) {
      await api(`${keys.tokens()}/${id}`, { method: 'DELETE' });
      void mutate(keys.tokens());
    },
  };
}
