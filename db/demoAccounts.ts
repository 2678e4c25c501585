import type { Role } from '@shared/people/roles';

/** Somebody of the demo's shop, with everything the doors show: nothing of it exists outside the demo. */
export interface DemoAccount {
  id: string;
  name: string;
  email: string;
  password: string;
  pin: string;
  roles: Role[];
}

/** Brindle Lane Engine Works: the shop behind both doors. */
export const DEMO_SHOP = '0199b21d-0000-7000-8000-00000000b1de';

const account = (n: number, name: string, pin: string, roles: Role[]): DemoAccount => {
  const first = name.split(' ')[0]?.toLowerCase() ?? '';
  const id = `0199b21d-0000-7000-8000-0000000000a${n}`;
  return { id, name, email: `${first}@brindle-lane.example`, password: `${first}-shows-the-demo`, pin, roles };
};

/** The six people of the demo. Names and PINs are invented. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  account(1, 'Ilse Marchetti-Vane', '481516', ['technician']),
  account(2, 'Tobias Renquist', '730294', ['supervisor']),
  account(3, 'Nadia Okwuosa', '592037', ['technician']),
  account(4, 'Perrin Halloway', '268413', ['clerk']),
  account(5, 'Oda Fennimore-Hale', '914605', ['keeper']),
  account(6, 'Desmond Achterberg', '347862', ['admin', 'supervisor']),
];
