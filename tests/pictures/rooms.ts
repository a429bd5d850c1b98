import type { Station } from './stations.ts';

/** The Shelf, groups, the account, the operator's room. */
export const rooms: readonly Station[] = [
  {
    name: 'shelf',
    who: 'ilse',
    show: async (page) => {
      await page.goto('/');
      await page.getByText('Diacetyl rest').first().waitFor();
    },
  },
  {
    name: 'shelf-loading',
    who: 'ilse',
    show: async (page) => {
      await page.route('**/api/shelf', () => undefined);
      await page.goto('/');
      await page.getByText('Taking the notebooks down…').waitFor();
      return () => page.unroute('**/api/shelf');
    },
  },
  {
    name: 'shelf-server-down',
    who: 'ilse',
    show: async (page) => {
      await page.route('**/api/shelf', (route) => route.abort());
      await page.goto('/');
      await page.getByRole('alert').waitFor();
      return () => page.unroute('**/api/shelf');
    },
  },
  {
    name: 'shelf-nothing-found',
    who: 'ilse',
    show: async (page) => {
      await page.goto('/');
      await page.getByLabel('Find').fill('no notebook has these words');
      await page.getByText('No notebook here answers').waitFor();
    },
  },
  {
    name: 'shelf-new-notebook',
    who: 'ilse',
    show: async (page) => {
      await page.goto('/');
      await page.getByRole('button', { name: 'New notebook' }).click();
      await page.getByRole('button', { name: 'Begin it' }).waitFor();
    },
  },
  {
    name: 'shelf-bin',
    who: 'ilse',
    show: async (page, stage) => {
      const group = await stage.groupNamed('ilse', 'Brewhouse Kinetics');
      const id = await stage.bringIn('ilse', group, 'Ester ratio under pressure', [
        { kind: 'prose', text: '# Ester ratio under pressure\n\nPut away.' },
      ]);
      await stage.send('ilse', 'DELETE', `/api/notebooks/${id}`);
      await page.goto('/');
      await page.getByText(/In the bin/u).click();
    },
  },
  {
    name: 'shelf-menu',
    who: 'ilse',
    widths: [1440],
    show: async (page) => {
      await page.goto('/');
      await page.getByRole('button', { name: /Ilse Marrowby/u }).click();
      await page.getByRole('menuitem').first().waitFor();
    },
  },
  { name: 'shelf-reader', who: 'tamsin', show: async (page) => void (await page.goto('/')) },
  {
    name: 'shelf-empty',
    who: 'newcomer',
    show: async (page) => {
      await page.goto('/');
      await page.getByRole('heading', { name: 'The Shelf' }).waitFor();
    },
  },
  {
    name: 'shelf-empty-new-notebook',
    who: 'newcomer',
    show: async (page) => {
      await page.goto('/');
      await page.getByRole('button', { name: 'New notebook' }).first().click();
      await page.getByRole('dialog').waitFor();
    },
  },
  { name: 'groups', who: 'ilse', show: async (page) => void (await page.goto('/groups')) },
  { name: 'groups-empty', who: 'newcomer', show: async (page) => void (await page.goto('/groups')) },
  { name: 'records', who: 'ilse', show: async (page) => void (await page.goto('/records')) },
  { name: 'records-empty', who: 'newcomer', show: async (page) => void (await page.goto('/records')) },
  {
    name: 'group',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page.getByRole('heading', { name: 'Brewhouse Kinetics' }).waitFor();
    },
  },
  {
    name: 'group-inviting',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page.getByRole('button', { name: 'Invite someone…' }).click();
      await page.getByRole('region', { name: /Invite someone to/u }).waitFor();
    },
  },
  {
    name: 'group-invited',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page.getByRole('button', { name: 'Invite someone…' }).click();
      const panel = page.getByRole('region', { name: /Invite someone to/u });
      await panel.getByLabel('Email').fill(`guest.${Date.now()}@example.org`);
      await panel.getByRole('button', { name: 'Send the invitation' }).click();
      await panel.getByText('is on its way').waitFor();
    },
  },
  {
    name: 'group-handing-over',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page.getByRole('button', { name: 'Hand over…' }).click();
      await page.getByRole('dialog').waitFor();
    },
  },
  {
    name: 'group-removing',
    who: 'ilse',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page
        .getByRole('button', { name: /^Remove/u })
        .first()
        .click();
      await page.getByRole('dialog').waitFor();
    },
  },
  {
    name: 'group-reader',
    who: 'tamsin',
    show: async (page, stage) => {
      const [first] = await stage.ask<readonly { id: string }[]>('tamsin', '/api/groups');
      await page.goto(`/groups/${first?.id ?? ''}`);
      await page.getByRole('table').first().waitFor();
    },
  },
  {
    name: 'group-forbidden',
    who: 'newcomer',
    show: async (page, stage) => {
      await page.goto(`/groups/${await stage.groupNamed('ilse', 'Brewhouse Kinetics')}`);
      await page.getByText('not open to you').waitFor();
    },
  },
  { name: 'account', who: 'ilse', show: async (page) => void (await page.goto('/account')) },
  {
    name: 'account-refused',
    who: 'ilse',
    show: async (page) => {
      await page.goto('/account');
      await page.locator('#current').fill('not my password');
      await page.locator('#next').fill('short');
      await page.getByRole('button', { name: 'Change it' }).click();
      await page.getByText(/at least 10 characters\./u).waitFor();
    },
  },
  {
    name: 'operator',
    who: 'orla',
    show: async (page) => {
      await page.goto('/operator');
      await page.getByRole('heading', { name: 'People' }).waitFor();
    },
  },
  {
    name: 'operator-refused',
    who: 'ilse',
    show: async (page) => {
      await page.goto('/operator');
      await page.getByText('Only the operator').waitFor();
    },
  },
  { name: 'shelf-operator', who: 'orla', show: async (page) => void (await page.goto('/')) },
];
