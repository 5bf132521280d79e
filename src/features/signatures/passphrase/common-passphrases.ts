/**
 * Long passphrases that guessers try first, in the form of `plainForm`: lower case, letters and digits alone. Own list,
 * collected from what people are known to choose when length is demanded (common practice): doubled words, rows of the
 * keyboard, counting, famous first lines.
 */
const refused = `
passwordpassword password12345678 password123456789 password1234567890 passwordpassword1 passwordpassword123
mypasswordmypassword mypassword123456 mypasswordisstrong thisismypassword thisismypassword1 thisisapassword
thisisapassphrase thisismypassphrase mypassphraseislong passphrasepassphrase mysecretpassword supersecretpassword
verysecretpassword averylongpassword averylongpassphrase longpasswordlong changemechangeme changethispassword
letmeinletmein123 letmeinletmeinletmein pleaseletmein123 welcomewelcome123 welcome123456789 welcometothejungle
adminadminadmin administrator123 administratoradministrator administratorpassword rootrootrootroot
123456789012345 1234567890123456 12345678901234567890 123456789123456789 012345678901234 987654321098765
111111111111111 000000000000000 121212121212121212 112233445566778899 123123123123123 123412341234123412
qwertyuiopasdfg qwertyuiopasdfgh qwertyuiopasdfghjkl qwertyuiopasdfghjklzxcvbnm qwertyqwertyqwerty qwerty1234567890
1qaz2wsx3edc4rfv 1qaz2wsx3edc4rfv5tgb 1q2w3e4r5t6y7u8i9o0p asdfghjklasdfghjkl zxcvbnmzxcvbnm123 qazwsxedcrfvtgb
abcdefghijklmno abcdefghijklmnop abcdefghijklmnopqrstuvwxyz abcabcabcabcabc abcd1234abcd1234 abc123abc123abc123
iloveyouiloveyou iloveyouverymuch iloveyouforever iloveyousomuch123 iloveyou123456789 iloveyoutothemoonandback
correcthorsebatterystaple thequickbrownfox thequickbrownfoxjumpsoverthelazydog tobeornottobethatisthequestion
tobeornottobetobeornottobe itwasthebestoftimes callmeishmaelcallmeishmael onceuponatimethere maytheforcebewithyou
twinkletwinklelittlestar happybirthdaytoyou maryhadalittlelamb loremipsumdolorsitamet helloworldhelloworld
sunshinesunshine footballfootball baseballbaseball monkeymonkeymonkey dragondragondragon princessprincess
supermansuperman starwarsstarwars trustnooneatall trustno1trustno1 whateverwhatever opensesameopensesame
halfsilverhalfsilver halfsilveredmirror halfsilverpassword halfsilverpassphrase laboratorynotebook mylaboratorynotebook
singlephotonsingle singlephotonsource photonphotonphoton laboratorylaboratory
`

const list: ReadonlySet<string> = new Set(refused.trim().split(/\s+/))

/** What is left when only what a guesser does not vary is kept: lower case, letters and digits, usual swaps undone. */
function plainForm(passphrase: string): string {
  return passphrase
    .normalize('NFKC')
    .toLowerCase()
    .replaceAll('@', 'a')
    .replaceAll('$', 's')
    .replace(/[^\p{L}\p{N}]/gu, '')
}

/** Whether a passphrase is on the list, also with other capitals, spaces or signs. */
export function isCommon(passphrase: string): boolean {
  return list.has(plainForm(passphrase))
}
