/**
 * What is tried first when somebody guesses. Nobody can list it all: these are the words that common passwords are
 * made of (written down from memory), together with the shapes they are used in.
 */
const WORDS = new Set(
  `password passwort passphrase passw0rd pass word secret secrets qwerty qwertyuiop qwertz azerty asdf asdfgh asdfghjkl
  zxcvbn zxcvbnm letmein welcome willkommen admin administrator root user username guest login master monkey dragon
  football baseball basketball hockey soccer superman batman spiderman pokemon starwars princess sunshine shadow
  iloveyou love loveyou forever trustno iamgod whatever freedom flower summer winter spring autumn january february
  march april may june july august september october november december monday friday sunday michael jennifer jordan
  hunter killer ginger pepper cookie chocolate banana orange purple silver golden computer internet google facebook
  changeme change me default test testing tester demo sample temp temporary hello hallo world helloworld bonjour
  physics physik quantum momentum angular wigner clebsch gordan surd surdmark schrodinger heisenberg einstein newton
  university universitat professor student teacher book textbook exam answer answers key correct horse battery staple
  abc abcd abcde abcdef abcdefg abcdefgh qaz wsx edc rfv mustang ferrari porsche mercedes london paris berlin
  liverpool arsenal chelsea barcelona juventus america england deutschland samsung android iphone apple windows
  microsoft linux ubuntu please thankyou thanks nothing something anything everything jesus christ god angel blessed
  the and my your our this that is it i you a to in of for new old one two three big little`
    .split(/\s+/)
    .filter(Boolean),
);

const LEET: Record<string, string> = {
  "0": "o",
  "1": "i",
  "3": "e",
  "4": "a",
  "5": "s",
  "7": "t",
  "@": "a",
  $: "s",
  "!": "i",
};

const ROWS = [
  "abcdefghijklmnopqrstuvwxyz",
  "01234567890123456789",
  "qwertyuiopasdfghjklzxcvbnm",
  "qwertzuiopasdfghjklyxcvbnm",
  "azertyuiopqsdfghjklmwxcvbn",
  "1qaz2wsx3edc4rfv5tgb6yhn7ujm8ik9ol0p",
  "1q2w3e4r5t6y7u8i9o0p",
];
const RUNS = [...ROWS, ...ROWS.map((row) => [...row].reverse().join(""))];

/** Whether the password is among what is guessed first: one run, one repeated piece, or only very common words with digits around them. */
export function isCommonPassword(password: string): boolean {
  const plain = password.toLowerCase();
  const packed = plain.replace(/[\s\p{P}\p{S}]/gu, "");
  if (new Set(plain).size <= 3 || isRepeated(plain) || isRepeated(packed)) return true;
  if (RUNS.some((row) => (row + row).includes(packed))) return true;
  // Digits before and after are only decoration; digits inside stand for letters.
  const core = plain.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, "");
  const spelled = [...core].map((character) => LEET[character] ?? character).join("");
  return [plain, core, spelled].some((text) => isMadeOfCommonWords(text));
}

function isRepeated(text: string): boolean {
  const size = text.length;
  for (let piece = 1; piece <= Math.min(6, size / 2); piece++)
    if (
      text
        .slice(0, piece)
        .repeat(Math.ceil(size / piece))
        .slice(0, size) === text
    )
      return true;
  return false;
}

/**
 * Whether the letters split into at most three different words of the list, and the rest is digits or punctuation:
 * "Password2024!", "summer summer 1". Four unrelated words are a good pass phrase, whatever the words.
 */
function isMadeOfCommonWords(text: string): boolean {
  const letters = text.replace(/[^\p{L}]/gu, "");
  if (letters === "") return new Set(text).size <= 6;
  if (text.length - letters.length > 8) return false;
  const fewest = Array<number>(letters.length + 1).fill(Infinity);
  fewest[0] = 0;
  for (let end = 1; end <= letters.length; end++)
    for (let start = Math.max(0, end - 14); start < end; start++)
      if (WORDS.has(letters.slice(start, end)))
        fewest[end] = Math.min(fewest[end] ?? Infinity, (fewest[start] ?? Infinity) + 1);
  return (fewest[letters.length] ?? Infinity) <= 3 || /^correcthorsebatterystaple$/.test(letters);
}
