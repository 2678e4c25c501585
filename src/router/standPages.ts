/** Every page of the stand, each in a file of its own. */
export const standPages = {
  first: () => import('@/pages/stand/FirstPage.vue'),
  enrol: () => import('@/pages/stand/EnrolPage.vue'),
  signIn: () => import('@/pages/stand/SignInPage.vue'),
  jobs: () => import('@/pages/stand/JobsPage.vue'),
  job: () => import('@/pages/stand/JobPage.vue'),
  joint: () => import('@/pages/stand/JointPage.vue'),
  walk: () => import('@/pages/stand/WalkPage.vue'),
  tablet: () => import('@/pages/stand/TabletPage.vue'),
  settings: () => import('@/pages/stand/SettingsPage.vue'),
};

/**
 * Loads the whole stand while nobody waits for it. On a first visit no service worker answers yet, and the network at a
 * stand may go at any moment: what has been loaded once stays usable.
 */
export async function loadStand(): Promise<void> {
  await Promise.all(Object.values(standPages).map((load) => load()));
  const { loadRareScreens } = await import('@/components/walk/rareScreens');
  await loadRareScreens();
}
