import type { Page } from 'playwright-core';

/** The demo's people, all with the password `crossed-polars`. */
export const people = {
  admin: 'admin@portellery.example',
  instructor: 'instructor@portellery.example',
  secondInstructor: 'second.instructor@portellery.example',
  student: 'student@portellery.example',
  otherStudent: 'other.student@portellery.example',
  otherSchoolAdmin: 'admin@saltpan.example',
} as const;

/** Signs in on the page as a person would, and waits until the app has left the sign-in page. */
export async function signIn(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill('crossed-polars');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}
