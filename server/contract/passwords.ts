/** How passwords are kept and what a new one must be. OWASP ASVS 5.0, 6.2. */

/** argon2id, 19 MiB, t 2, p 1. A stored hash names its own figures, so these can grow. */
export const ARGON2ID = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const

export const PASSWORD_LEAST = 8
/** Longer than any sane phrase; keeps the work of one hash bounded. */
export const PASSWORD_MOST = 256

/** Among the most common in published breaches; the list is from memory, lower case. */
const COMMON = new Set(
  `password password1 password12 password123 passw0rd p@ssw0rd p@ssword 12345678 123456789 1234567890
  123123123 11111111 00000000 87654321 987654321 11223344 12341234 12344321 123454321 147258369 123321123
  qwertyui qwerty12 qwerty123 qwertyuiop qwerty1234 1q2w3e4r 1q2w3e4r5t 1qaz2wsx zaq12wsx q1w2e3r4 asdfghjk
  asdfghjkl asdf1234 zxcvbnm1 zxcvbnm123 iloveyou iloveyou1 iloveyou2 sunshine sunshine1 princess princess1
  football football1 baseball baseball1 basketball superman superman1 batman123 trustno1 letmein1 letmein123
  welcome1 welcome123 welcome2024 welcome2025 welcome2026 monkey123 dragon123 master123 michael1 jennifer
  jordan23 computer computer1 internet samsung1 whatever starwars pokemon1 charlie1 liverpool chelsea1
  arsenal1 barcelona realmadrid november december january1 summer2024 summer2025 summer2026 winter2025
  winter2026 spring2026 autumn2026 abcd1234 abc12345 abcdefgh abcdefg1 aa123456 a1234567 admin123 admin1234
  administrator changeme changeme1 default1 secret123 test1234 testtest guest123 hello123 hello1234 loveyou1
  lovely123 flower123 freedom1 shadow123 ashley123 nicole123 daniel123 jessica1 michelle tinkerbell
  butterfly chocolate elephant1 hunter12 killer123 mustang1 corvette mercedes ferrari1 harley123 yankees1
  cowboys1 steelers gymgymgym workout1 fitness1 fitness123 training1 floorside floorside1`
    .split(/\s+/)
    .filter(Boolean),
)

/** What is wrong with a new password, as a sentence; null where it may be used. Any character counts. */
export function passwordProblem(password: string): string | null {
  const length = [...password].length
  if (length < PASSWORD_LEAST)
    return `Use at least ${PASSWORD_LEAST} characters; a few words in a row are good.`
  if (length > PASSWORD_MOST) return `Use at most ${PASSWORD_MOST} characters.`
  if (COMMON.has(password.toLowerCase()) || /^(.)\1+$/u.test(password)) {
    return 'That one is among the first that anybody tries. Choose another.'
  }
  return null
}
