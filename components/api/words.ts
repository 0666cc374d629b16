import { ApiProblem, NoAnswer } from './problem';

/** Words for whatever was thrown: what happened, and the next step. Never a stack, a code or a status. */
export function problemWords(error: unknown): { title: string; text: string } {
  if (error instanceof NoAnswer) {
    return {
      title: 'The server cannot be reached',
      text: 'Check your connection and try again. What you entered is still here.',
    };
  }
  if (error instanceof ApiProblem) {
    if (error.status === 429) return { title: 'Too many tries', text: 'Wait a minute, then try again.' };
    return { title: error.title, text: error.detail };
  }
  return { title: 'Something broke in this page', text: 'Reload the page. If it happens again, tell your school’s admin.' };
}
