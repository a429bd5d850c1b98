import type { Page } from 'playwright-core';
import type { Station } from './stations.ts';

const nowhere = 'A'.repeat(43);
const heading = (page: Page, name: string | RegExp) => page.getByRole('heading', { name }).first().waitFor();

/** Pages that are met before one is signed in, and addresses that lead nowhere. */
export const doors: readonly Station[] = [
  { name: 'sign-in', who: 'nobody', show: async (page) => void (await page.goto('/sign-in')) },
  {
    name: 'sign-in-refused',
    who: 'nobody',
    show: async (page) => {
      await page.goto('/sign-in');
      await page.getByLabel('Email').fill('nobody@example.org');
      await page.locator('#password').fill('not the password');
      await page.getByRole('button', { name: 'Sign in', exact: true }).click();
      await page.getByRole('alert').first().waitFor();
    },
  },
  {
    name: 'sign-up-by-invitation',
    who: 'nobody',
    show: async (page, stage) => {
      await stage.send('orla', 'PATCH', '/api/operator/settings', { signUp: 'invitation' });
      await page.goto('/sign-up');
      await page.getByText(/by invitation/u).waitFor();
    },
  },
  {
    name: 'sign-up-open',
    who: 'nobody',
    show: async (page, stage) => {
      await stage.send('orla', 'PATCH', '/api/operator/settings', { signUp: 'open' });
      await page.goto('/sign-up');
      await page.getByLabel(/Your name/u).waitFor();
    },
  },
  {
    name: 'sign-up-refused',
    who: 'nobody',
    show: async (page) => {
      await page.goto('/sign-up');
      await page.getByLabel('Email').fill('somebody@example.org');
      await page.getByLabel(/Your name/u).fill('Somebody');
      await page.locator('#password').fill('short');
      await page.getByRole('button', { name: 'Sign up', exact: true }).click();
      await page
        .getByText(/at least 10/u)
        .last()
        .waitFor();
    },
  },
  {
    name: 'sign-up-sent',
    who: 'nobody',
    show: async (page) => {
      await page.goto('/sign-up');
      await page.getByLabel('Email').fill(`somebody.${Date.now()}@example.org`);
      await page.getByLabel(/Your name/u).fill('Some Body');
      await page.locator('#password').fill('a long enough password');
      await page.getByRole('button', { name: 'Sign up', exact: true }).click();
      await page
        .getByText(/letter/u)
        .first()
        .waitFor();
    },
  },
  {
    name: 'confirm-expired',
    who: 'nobody',
    show: async (page) => {
      await page.goto(`/confirm/${nowhere}`);
      await page.getByRole('alert').waitFor();
    },
  },
  {
    name: 'confirm',
    who: 'nobody',
    show: async (page, stage) => {
      const email = `confirming.${Date.now()}@example.org`;
      await stage.send('nobody', 'POST', '/api/accounts', {
        email,
        name: 'Con Firm',
        password: 'long enough, this',
      });
      await page.goto(await stage.letterLink('confirm', email));
      await page.getByText(/confirmed/u).waitFor();
      return () => stage.forget('nobody');
    },
  },
  { name: 'new-password', who: 'nobody', show: async (page) => void (await page.goto('/new-password')) },
  {
    name: 'new-password-sent',
    who: 'nobody',
    show: async (page) => {
      await page.goto('/new-password');
      await page.getByLabel('Email').fill('dov@brewhouse-kinetics.example');
      await page.getByRole('button', { name: 'Send me a link' }).click();
      await page.getByText('is on its way').waitFor();
    },
  },
  {
    name: 'new-password-set',
    who: 'nobody',
    show: async (page, stage) =>
      void (await page.goto(await stage.letterLink('new-password', 'dov@brewhouse-kinetics.example'))),
  },
  {
    name: 'new-password-expired',
    who: 'nobody',
    show: async (page) => {
      await page.goto(`/new-password/${nowhere}`);
      await page.locator('#first').fill('a long enough password');
      await page.locator('#second').fill('a long enough password');
      await page.getByRole('button', { name: 'Set it' }).click();
      await page.getByRole('alert').first().waitFor();
    },
  },
  {
    name: 'invitation',
    who: 'nobody',
    show: async (page, stage) => {
      const group = await stage.groupNamed('ilse', 'Brewhouse Kinetics');
      const email = `sunniva.${Date.now()}@maltings.example`;
      const message = 'Welcome. Start with the assay cells in the diacetyl notebook.';
      await stage.send('ilse', 'POST', `/api/groups/${group}/invitations`, {
        email,
        role: 'author',
        notebooks: null,
        message,
      });
      await page.goto(await stage.letterLink('invitation', email));
      await heading(page, 'Take the invitation');
    },
  },
  {
    name: 'invitation-known',
    who: 'nobody',
    show: async (page, stage) => {
      const group = await stage.groupNamed('ilse', 'Brewhouse Kinetics');
      const email = 'orla@stillroom.example';
      await stage.send('ilse', 'POST', `/api/groups/${group}/invitations`, {
        email,
        role: 'reader',
        notebooks: null,
        message: '',
      });
      await page.goto(await stage.letterLink('invitation', email));
      await page.getByText('has an account here').waitFor();
    },
  },
  {
    name: 'invitation-as-another',
    who: 'tamsin',
    show: async (page, stage) => {
      await page.goto(await stage.letterLink('invitation', 'orla@stillroom.example'));
      await page.getByText('You are signed in as').waitFor();
    },
  },
  {
    name: 'invitation-expired',
    who: 'nobody',
    show: async (page) => {
      await page.goto(`/invitation/${nowhere}`);
      await page.getByRole('alert').waitFor();
    },
  },
  { name: 'unknown-address', who: 'nobody', show: async (page) => void (await page.goto('/nothing/here')) },
  {
    name: 'unknown-address-signed-in',
    who: 'ilse',
    show: async (page) => void (await page.goto('/nothing/here')),
  },
  { name: 'help', who: 'nobody', show: async (page) => void (await page.goto('/help/notation')) },
];
