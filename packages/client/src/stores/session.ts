import type { Me, SessionView } from '@stillroom/shared/contracts';
import { defineStore } from 'pinia';
import { ref } from 'vue';
import * as api from '../api/session.ts';

/** Who is signed in on this page. */
export const useSession = defineStore('session', () => {
  const me = ref<Me | null>(null);
  /** Whether the server has said who is signed in. */
  const known = ref(false);
  const signUp = ref<SessionView['signUp']>('invitation');
  const demo = ref<SessionView['demo']>([]);
  let asked: Promise<void> | null = null;

  async function ask(): Promise<void> {
    const session = await api.fetchSession();
    me.value = session.me;
    known.value = true;
    signUp.value = session.signUp;
    demo.value = session.demo;
  }

  /** Resolves once it is known who is signed in; asks the server once, and again after a failure. */
  function ready(): Promise<void> {
    asked ??= ask().catch((cause: unknown) => {
      asked = null;
      throw cause;
    });
    return asked;
  }

  async function signIn(email: string, password: string): Promise<void> {
    me.value = await api.signIn(email, password);
    asked = Promise.resolve();
  }

  async function signOut(): Promise<void> {
    await api.signOut();
    me.value = null;
    asked = null;
  }

  return { me, known, signUp, demo, ready, signIn, signOut };
});
