import * as z from 'zod/mini'

/** What the sign-in form asks for. The password is checked for being there, nothing else. */
export const signInForm = z.strictObject({
  email: z
    .string()
    .check(
      z.trim(),
      z.minLength(1, 'Type your e-mail address.'),
      z.maxLength(254, 'That is too long for an e-mail address.'),
      z.regex(/^[^@\s]+@[^@\s]+$/, 'An e-mail address has one @ with something on both sides.'),
    ),
  password: z
    .string()
    .check(z.minLength(1, 'Type your password.'), z.maxLength(200, 'That is too long.')),
})
export type SignInForm = z.infer<typeof signInForm>
