/**
 * Who may do what: one line per permission, naming the roles that hold it. A route names one of these keys; screens
 * ask the same table what to offer. A person may hold several roles and then may do what any of them may.
 *
 * What depends on the row and not on the role (the borrower of a loan never reads it at the bench, a second reader is
 * not the first) is a rule of the feature, not a permission.
 */
export const roles = ['student', 'instructor', 'admin'] as const;
export type Role = (typeof roles)[number];

const everyone = ['student', 'instructor', 'admin'] as const;
const staff = ['instructor', 'admin'] as const;
const instructors = ['instructor'] as const;
const admins = ['admin'] as const;

export const permissions = {
  // Catalogue
  'kit:browse': everyone, // neutral titles and descriptions only
  'kit:read': staff,
  'kit:write': staff,
  'stone:read': staff,
  'stone:write': staff,
  'reading:write': staff, // readings at intake, which make the record
  'species:read': everyone, // the printed ranges of species, not of any stone
  'photo:read': everyone, // which photos a borrower may see is decided row by row
  'photo:write': staff,
  'instrument:read': staff,
  'instrument:write': staff,
  // Labels
  'label:read': staff,
  'label:write': staff,
  'label:resolve': everyone,
  // Loans and deposits
  'loan:own': everyone, // instructors and admins borrow too, and are then as blind as a student
  'loan:read': staff,
  'loan:staff': staff, // take out, return and cancel for somebody else
  // Bench and settlement
  'bench:read': staff,
  'bench:write': instructors,
  'settle:read': staff,
  'settle:agree': staff, // one of the two people who accept a stone that readings cannot settle
  'settle:write': admins, // ends that cost somebody money, and the money itself
  'verdict:trial': staff,
  // Money, desk and custody
  'money:read': admins,
  'desk:read': staff,
  'custody:read': staff,
  // People and school
  'people:read': staff,
  'people:write': admins,
  'school:read': everyone,
  'school:write': admins,
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof permissions;
