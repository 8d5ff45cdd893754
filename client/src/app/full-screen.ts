/** A route's handle for pages that take the whole screen, without the project's rail. */
export const FULL_SCREEN = 'full-screen';
