/** Parts of the desk settings. */
export const DESK_SETTINGS_TABS = [
  { key: 'runs', name: 'Nightly runs', href: '/desk-settings/runs' },
  { key: 'policy', name: 'Policy', href: '/desk-settings/policy' },
] as const;
