import type { Role } from '../api/types';

/** What each role is for, in the words of the invitation form. */
export const ROLES: readonly { value: Role; label: string; description: string }[] = [
  { value: 'chemist', label: 'Chemist', description: 'predicts spectra' },
  { value: 'instructor', label: 'Instructor', description: 'prepares collections for teaching' },
  { value: 'leader', label: 'Leader', description: 'reviews runs' },
  { value: 'admin', label: 'Admin', description: 'manages people and machines' },
];

// The server decides; these only keep buttons away that it would refuse.

/** People, invitations and the laboratory's name. */
export function mayManage(role: Role): boolean {
  return role === 'admin';
}

export function maySeeWorkers(role: Role): boolean {
  return role === 'admin' || role === 'leader';
}
