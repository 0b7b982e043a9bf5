import { z } from 'zod';
import { listOf } from './common';
import { Health } from './events';
import { Me, Member, MemberChange, MemberDraft, NewToken, Token, TokenDraft } from './people';
import { Region, RegionChange, RegionDraft } from './regions';
import type { Endpoint } from './endpoint';

export const TEAM_ENDPOINTS: readonly Endpoint[] = [
  {
    method: 'get',
    path: '/health',
    summary: 'Whether the parts are running',
    open: true,
    answer: { status: 200, schema: Health },
  },
  {
    method: 'get',
    path: '/openapi.json',
    summary: 'This document',
    open: true,
    answer: { status: 200, schema: z.looseObject({}) },
  },
  {
    method: 'get',
    path: '/me',
    summary: 'The person, the team, the role',
    answer: { status: 200, schema: Me },
  },
  {
    method: 'get',
    path: '/events',
    summary: 'Server-sent events: what changed',
    answer: { status: 200, binary: 'text/event-stream' },
  },

  { method: 'get', path: '/members', summary: 'The team', answer: { status: 200, schema: listOf(Member) } },
  {
    method: 'post',
    path: '/members',
    summary: 'Take a person into the team',
    body: MemberDraft,
    answer: { status: 201, schema: Member },
  },
  {
    method: 'patch',
    path: '/members/:personId',
    summary: 'Change a role',
    body: MemberChange,
    answer: { status: 200, schema: Member },
  },
  {
    method: 'delete',
    path: '/members/:personId',
    summary: 'Let a person leave the team',
    answer: { status: 204 },
  },
  {
    method: 'get',
    path: '/tokens',
    summary: 'Personal access tokens',
    answer: { status: 200, schema: listOf(Token) },
  },
  {
    method: 'post',
    path: '/tokens',
    summary: 'Make a token; its secret is shown once',
    body: TokenDraft,
    answer: { status: 201, schema: NewToken },
  },
  { method: 'delete', path: '/tokens/:tokenId', summary: 'Revoke a token', answer: { status: 204 } },

  {
    method: 'get',
    path: '/regions',
    summary: 'Regions of the team',
    answer: { status: 200, schema: listOf(Region) },
  },
  {
    method: 'post',
    path: '/regions',
    summary: 'Make a region',
    body: RegionDraft,
    answer: { status: 201, schema: Region },
  },
  { method: 'get', path: '/regions/:regionId', summary: 'A region', answer: { status: 200, schema: Region } },
  {
    method: 'patch',
    path: '/regions/:regionId',
    summary: 'Rename or describe a region',
    body: RegionChange,
    answer: { status: 200, schema: Region },
  },
];
