import { z } from 'zod'

/** What the sign-in form asks for. */
export const signInSchema = z.object({
  email: z.string({ required_error: 'Enter your e-mail address.' }).trim().min(1, 'Enter your e-mail address.').max(254, 'Enter an e-mail address of at most 254 characters.').email('Enter an e-mail address such as name@example.org.'),
  password: z.string({ required_error: 'Enter your password.' }).min(1, 'Enter your password.').max(512, 'Enter a password of at most 512 characters.'),
}).strict()

/** The id in the path of a session's route. */
export const sessionParams = z.object({ sessionId: z.string().uuid('There is no such session.') }).strict()
