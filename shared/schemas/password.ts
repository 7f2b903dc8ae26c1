import { z } from 'zod'

/**
 * NIST SP 800-63B: length and a list of the commonest, no rules of composition, no expiry. The upper limit only keeps
 * hashing cheap.
 */
export const PASSWORD_LEAST = 12
export const PASSWORD_MOST = 200

/** The commonest of those long enough to pass the first rule: runs along the keyboard and words said twice. */
const COMMONEST = new Set([
  '000000000000', '111111111111', '112233445566', '123123123123', '123412341234', '123456123456', '123456789000', '123456789012',
  '1234567890123', '12345678901234', '123456789101', '1234567891011', '123456789123', '1234567890qwe', '1q2w3e4r5t6y', '1qaz2wsx3edc',
  '1234qwerasdf', '987654321098', 'aaaaaaaaaaaa', 'abc123abc123', 'abcd12345678', 'abcdefghijkl', 'abcdefghijklm', 'administrator',
  'adminadminadmin', 'admin1234567', 'asdfasdfasdf', 'asdfghjkl123', 'changemechangeme', 'changeme1234', 'correcthorsebatterystaple', 'defaultpassword',
  'iloveyou1234', 'iloveyouiloveyou', 'letmeinletmein', 'letmein12345', 'mypassword123', 'p@ssw0rd1234', 'passw0rd1234', 'password0000',
  'password1234', 'password12345', 'password123456', 'password2024', 'password2025', 'password2026', 'passwordpassword', 'passwort1234',
  'q1w2e3r4t5y6', 'qazwsxedcrfv', 'qwerty123456', 'qwerty1234567', 'qwertyqwerty', 'qwertyuiop12', 'qwertyuiop123', 'qwertyuiop[]',
  'qwertyuiopas', 'secretsecret', 'sunshine1234', 'superman1234', 'welcome12345', 'welcomewelcome', 'zaq12wsxcde3', 'zxcvbnm12345',
])

/** A password somebody is about to choose; `label` opens the sentence. */
export const chosenPassword = (label = 'a password') => {
  const name = label.replace(/^(a|the|your) /, '').replace(/^./, letter => letter.toUpperCase())
  return z.string({ error: `Enter ${label}` })
    .min(1, `Enter ${label}`)
    .min(PASSWORD_LEAST, `${name} must have at least ${PASSWORD_LEAST} characters; a few words in a row do well`)
    .max(PASSWORD_MOST, `${name} must have ${PASSWORD_MOST} characters or less`)
    .refine(password => !COMMONEST.has(password.toLowerCase()), `${name} is one of the commonest there are: choose another`)
}

/** A password somebody already has: only its presence is checked, and that it is not absurdly long. */
export const heldPassword = (label: string) => z.string({ error: `Enter ${label}` })
  .min(1, `Enter ${label}`).max(PASSWORD_MOST, 'That is longer than any password here')
