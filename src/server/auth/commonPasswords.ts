/**
 * Passwords and words that guessers try first.
 *
 * A modest list: 150 whole passwords of 15 characters or more, and 281 words, names and runs of keys of which
 * such passwords are put together. It was written for this product from memory of what people choose, and is not
 * drawn from a collection of leaked passwords. A lender who has such a collection checks against it at the place
 * where people's passwords are kept for all its systems.
 */
export const COMMON_PASSWORDS: ReadonlySet<string> = new Set([
  'correcthorsebatterystaple',
  'correct horse battery staple',
  'correct-horse-battery-staple',
  'tobeornottobe123',
  'tobeornottobethatisthequestion',
  'to be or not to be',
  'thequickbrownfox',
  'thequickbrownfoxjumps',
  'the quick brown fox',
  'thequickbrownfoxjumpsoverthelazydog',
  'the quick brown fox jumps over the lazy dog',
  'loremipsumdolorsitamet',
  'lorem ipsum dolor sit amet',
  'maytheforcebewithyou',
  'may the force be with you',
  'onceuponatime123',
  'once upon a time',
  'iloveyouforever',
  'iloveyousomuch1',
  'iloveyousomuch!',
  'ilovemyhusband1',
  'ilovemyfamily12',
  'ilovemychildren',
  'iloveyoubabygirl',
  'mysupersecretpassword',
  'mysecretpassword',
  'thisismypassword',
  'this is my password',
  'thisisapassword',
  'this is a password',
  'thisismypassword1',
  'thisisasecret123',
  'thisisnotmypassword',
  'ihatepasswords1',
  'ihatepasswords!',
  'ihatethispassword',
  'iforgotmypassword',
  'i forgot my password',
  'idontknowmypassword',
  'pleaseletmein123',
  'letmeinletmein1',
  'opensesameopensesame',
  'opensesame12345',
  'trustno1trustno1',
  'donttellanyone1',
  'nobodyknowsthis',
  'itsasecretdonttell',
  'twinkletwinklelittlestar',
  'happybirthdaytoyou',
  'happy birthday to you',
  'merrychristmas1',
  'merrychristmas!',
  'happynewyear2024',
  'happynewyear2025',
  'happynewyear2026',
  'carpediemcarpediem',
  'welcometothejungle',
  'welcometotheparty',
  'rememberthis123',
  'rememberme12345',
  'lastchance12345',
  'imissyousomuch1',
  'liverpoolfootballclub',
  'manchesterunited',
  'manchesterunited1',
  'realmadridbarcelona',
  'youllneverwalkalone',
  'supercalifragilisticexpialidocious',
  'antidisestablishmentarianism',
  'abracadabra12345',
  'hocuspocusabracadabra',
  'oncebittentwiceshy',
  'lifeisbeautiful',
  'life is beautiful',
  'lifeisbeautiful1',
  'everythingisawesome',
  'godisgoodallthetime',
  'jesuslovesmethisiknow',
  'inthebeginning1',
  'inthebeginning!',
  'thelordismyshepherd',
  'callmemaybe12345',
  'whatsmypassword',
  'whatismypassword',
  'what is my password',
  'nopasswordneeded',
  'passwordincorrect',
  'incorrectpassword',
  'your password is incorrect',
  'fifteencharacter',
  'fifteencharacters',
  'fifteen characters',
  'sixteencharacter',
  'sixteencharacters',
  'atleast15characters',
  'longpassword123',
  'averylongpassword',
  'a very long password',
  'reallylongpassword',
  'verysecurepassword',
  'verystrongpassword',
  'strongpassword1',
  'strongpassword123',
  'supersecurepassword',
  'newpassword12345',
  'oldpassword12345',
  'mynewpassword123',
  'changethispassword',
  'changemechangeme',
  'changemeplease1',
  'temporarypassword',
  'defaultpassword',
  'companypassword',
  'workpassword123',
  'officepassword1',
  'bankpassword123',
  'adminadminadmin',
  'administrator123',
  'administrator1!',
  'rootrootrootroot',
  'testtesttesttest',
  'useruseruseruser',
  'zaq1zaq1zaq1zaq1',
  'qwertyuiopasdfgh',
  'qwertyuiopasdfghjkl',
  'qwertyuiopasdfghjklzxcvbnm',
  '1qaz2wsx3edc4rfv',
  '1qaz2wsx3edc4rfv5tgb',
  '!qaz@wsx#edc$rfv',
  '1q2w3e4r5t6y7u8i',
  '1q2w3e4r5t6y7u8i9o0p',
  'q1w2e3r4t5y6u7i8',
  'abcdefghijklmno',
  'abcdefghijklmnop',
  'abcdefghijklmnopqrstuvwxyz',
  'abcdefg123456789',
  'abc123abc123abc',
  '123456789012345',
  '1234567890123456',
  '12345678901234567890',
  '012345678901234',
  '098765432109876',
  '111111111111111',
  '000000000000000',
  '112233445566778',
  '123123123123123',
  '314159265358979',
  '3.14159265358979',
  '271828182845904',
  '2.71828182845904',
]);

/** Looked for anywhere in a password, longest first. */
export const COMMON_WORDS: readonly string[] = `
  password passwort passw0rd p@ssword p@ssw0rd pa55word pass motdepasse contrasena wachtwoord secret
  secure security welcome welkom willkommen bienvenue hello hallo letmein login logon signin access
  enter open default changeme change temporary temp test testing tester demo sample example guest user
  username admin administrator root superuser master manager office company corporate business finance
  banking bank loan lender lending credit covenant analyst committee underkeel monday tuesday
  wednesday thursday friday saturday sunday january february march april june july august september
  october november december spring summer autumn winter today tomorrow forever iloveyou ilove love
  lover baby angel princess prince sunshine rainbow flower butterfly chocolate cookie monkey dragon
  tiger lion eagle falcon shark panther phoenix unicorn pony puppy kitten football baseball basketball
  hockey soccer tennis rugby cricket golf champion winner player batman superman spiderman ninja
  pirate warrior knight wizard shadow killer hunter ranger soldier captain computer internet laptop
  windows system server network database website email account profile keyboard freedom peace hope
  faith trust happy lucky smile music guitar piano star moon mercury london paris berlin madrid york
  amsterdam dublin england germany france spain europe america michael daniel thomas andrew joshua
  jordan robert william charlie jessica jennifer ashley michelle nicole hannah blue green orange
  purple yellow silver golden diamond platinum please thanks whatever nothing something qwertyuiop
  qwertyuio qwertyui qwertyu qwerty qwert qwertz qwertzuiop azerty azertyuiop asdfghjkl asdfghjk
  asdfgh asdf zxcvbnm zxcvbn zxcv poiuytrewq lkjhgfdsa mnbvcxz qazwsxedc qazwsx wsxedc edcrfv rfvtgb
  tgbyhn yhnujm 1qaz2wsx3edc 1qaz2wsx 1qaz 2wsx 3edc 4rfv 1q2w3e4r5t6y 1q2w3e4r5t 1q2w3e4r 1q2w3e
  q1w2e3r4t5 q1w2e3r4 zaq12wsx abcdefghijklmnopqrstuvwxyz abcdefghij abcdefgh abcdef abcd1234 abc123
  abcd aabbcc 12345678901234567890 1234567890 123456789 12345678 1234567 123456 12345 1234 0987654321
  987654321 87654321 7654321 654321 54321 0123456789 012345678 147258369 159753 123321 112233 121212
  696969 24681012 13579 2468
`
  .trim()
  .split(/\s+/);
