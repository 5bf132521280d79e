/**
 * 2048 common English words of four to seven letters, chosen for this program: one drawn at random carries 11 bits.
 * No two differ only in spelling by sound (no "flour" beside "flower"), so that a phrase can be read out.
 */
const text = `
able about above absent accept acid across action active actor actual adapt admire admit adopt adult
advance advice affair afford afraid after again agent agree ahead album alert alive alley allow almond
almost alone along alpine already also always amber ample amuse anchor angel anger angle animal ankle
annual answer antler apart apple apply april apron arch arctic area arena argue arise armour army around
arrange arrive arrow aside asleep aspect aspen assist atlas atom attach attempt attend attic august aunt
author autumn avenue avoid awake award aware away axis baby back bacon badge badger bagel bake balance
balcony ball ballad bamboo banana band banjo bank banner barber bargain bark barley barn barrel base basic
basil basin basket batch bath bead beak beam bean beard beast beat beauty beaver become beef beetle before
begin behave behind being belief bell belong below belt bench bend berry beside best better beyond bicycle
bike bill bind birch bird birth bishop bison bite black blade blank blanket blast blaze blend bless blind
blink block blond bloom blossom blow blunt boast boat body boil bold bolt bone bonus book boom boot border
borrow boss both bottle bottom bounce bowl bracket brain branch brand brass brave bread breath breeze
brick bridge brief bright bring brisk broad broken bronze brook broom brown brush bubble bucket budget
buffalo build bulb bull bumper bunch bundle bunny burn burst bush busy butter button buzz cabin cable
cactus cage cake calf call calm camel camera camp canal canary candle candy cannon canoe canvas canyon
cape capital captain carbon card care career careful cargo carpet carrot carry cart carve case cash castle
casual catch cattle cause cave cedar celery cellar cello cement central centre certain chain chair chalk
chamber chance change chapel chapter charge charm chart chase check cheek cheer cheese chef cherry chess
chest chew chief child chimney chin chip choice choir choose chorus church cider cinema circle circus city
civil claim clap class clay clean clear clerk clever cliff climate climb clinic cloak clock close cloth
cloud clover clown club clue clumsy coach coal coast coat cobalt cobweb cocoa coconut code coffee coil
coin cold collar college colour column comb come comet comfort comic common compass conduct cone confirm
contain control cook cool copper copy coral core cork corn corner correct cosmic cost cosy cottage cotton
couch cough count country couple court cousin cover coyote crab crack cradle craft crane crater crawl
crayon cream create credit creek creep crew cricket crisp critic crop cross crow crowd crown cruise crumb
crust cube cuckoo curb curious curl current curry curve cushion custom cycle daily dairy daisy damp dance
dare dark dash data date dawn deal debate decade decide deck deep defend degree delay deliver delta demand
dense dental depend depth deputy desert design desk detail detect device dial diamond diary diesel diet
differ digital dinner direct disc dish dismiss ditch dive divide dock doctor doll domain donkey door dose
double dove down dozen draft dragon drain drama draw drawer dream dress drift drill drink drive drop drum
duck dune during dusk dust duty dwarf each eager eagle early earn earth ease east easy echo eclipse edge
edit effort eight either elastic elbow elder elect element eleven else ember emotion empire employ empty
enable enemy energy engine enjoy enough enter entire entry equal errand escape essay estate eternal event
ever every exact example except excite excuse exile exist exit exotic expand expect expert explain explore
export extend extra eyebrow fable fabric face fact fade faint faith falcon fall false fame family famous
fancy farm fashion fast father favour feast feed feel fellow fence fern ferry fetch fibre fiction fiddle
field fifteen figure file fill film filter final find fine finger finish fire firm first fish five flag
flame flash flask flat flavour flax fleet flesh flight flint flip float flock flood floor flow fluid flute
foam focus foil fold folk follow food foot forest forget fork form formal forty forum forward fossil found
frame free freeze freight fresh friday friend frog front frost frown frozen fruit fuel full fund funny
furnace future gadget gain galaxy gale gallon gallop game garage garden garlic garment gate gather gauge
gaze gear gentle genuine giant gift giggle ginger giraffe girl give glacier glad glance glass glide globe
glove glow glue goal goat gold golf gong good goose gorge gorilla gospel govern gown grab grace grade
grain grand granite grant grape graph grasp grass gravel gravy green greet grey grid grind grip grocer
ground group grove grow growl guard guess guide guitar gulf gull gutter habit hail half hall hallway halt
hammer hamper hand handle hang happen happy harbour hard hatch have hawk hazel head health heap heart heat
heaven heavy hedge height helmet help herb herd hero heron herring hidden high hill hinge hint hire hive
hobby hockey hold holiday hollow holly home honest honey hood hoof hook hope horn horse host hotel hour
house hover huge human humble humid humour hundred hungry hunt hurdle hurry hybrid hymn icicle icon idea
ideal idle igloo ignore image imagine impact import impose improve inch include income indeed index indoor
infant inform inhale inject inland inner input insect inside inspect instant instead insure intend invent
invest invite iris iron island issue item ivory jacket jade jaguar january jazz jeans jelly jewel jigsaw
jockey join joke jolly journey judge juice july jumble jump jumper june jungle junior juror just justice
karate keen keep kennel kettle kick kidney kilo kind kingdom kiosk kiss kite kitten kiwi knee knife knit
knob knock knot know koala label labour lace ladder lady lake lamb lamp land lane lantern large lark last
late laugh launch laurel lava lawn lawyer layer lead leaf league leak lean learn lease leather leave leek
left legal legend leisure lemon lend length lens leopard less lesson letter level lever liberty licence
life lift light lily limb lime limit linen liner link lion liquid list listen litre little live lively
lizard load loaf loan lobby local lock locket lodge logic lonely long look loop loose lorry lotus loud
lounge love loyal lucky luggage lumber lunar lunch lung luxury lyric machine madam magic magnet magpie
major make mammal manage mango manner manor mantle manual many maple marble march margin marine mark
market marmot marry marsh mask mason mass master match mate maths matter maybe mayor meadow meal mean
measure medal media medium mellow melody melon melt member memory mend mental menu merit merry mesh
message metal meteor method metre metro middle might mild mile milk mill mime mind minor mint minus minute
mirror mist mister mitten mixture moat mobile model modern modest moist mole moment monday money monkey
month mood moon moor moose morning mosaic moss most moth mother motion motor mould mount mouse mouth move
movie much muffin mule mural museum music must mustard mutton mutual myself myth nail name napkin narrow
nation native nature navy near neat neck need needle neglect nephew nerve nest neutral never news next
nice nickel niece nimble nine noble noise noon normal north nose note notice novel nuclear number nurse
nutmeg nylon oasis obey object oblige observe obtain ocean october offer office often olive once onion
online only opal open opera opinion oppose option oral orange orbit orchid order organ orient origin
ostrich other otter outdoor outer outfit outlet oval oven over owner oxygen oyster pack packet paddle page
paint palace palm pancake panda panel paper parade parcel pardon parent park parrot parsley part party
pass past pasta paste pastry patch path patient patrol pattern peach peak peanut pearl pebble peel pelican
pencil penny people pepper perfect perfume perhaps period permit person petal petrol phone photo phrase
piano pick pickle picnic pier pigeon pile pill pillow pilot pine pink pint pipe pitch pizza place plan
planet plank plant plaster plate play please plenty plot plough pluck plug plum plunge plus pocket poem
poet point polar pole police polish polite pollen pond pony pool poor poppy porch pork port portion pose
post potato pouch pound pour powder power praise prefer prepare press pretty prevent price pride primary
print prize problem produce promise proof proper protect proud prove public pudding pull pulp pulse pump
pupil puppet puppy pure purple purpose purse push puzzle quail quality quantum quarry quartz queen query
quest queue quick quiet quilt quince quit quite quiz quote rabbit raccoon race rack radar radio radish
raft rail raise raisin ramp ranch random range rapid rare rather raven razor reach react read ready real
reason recall recipe record recover reduce reed reef reform refuse region regular relax relay release
relief rely remain remark remedy remind remote remove rent repair repeat reply report request rescue
resist respect rest result retire return reveal review reward rhythm ribbon rice rich ride ridge rigid
ring rinse ripe ripple rise risk ritual rival river roast robin robot robust rock rocket romance roof rook
room rope rose rotate rough round rowing royal rubber ruby rugby rule rumour rural rush rust rustic sack
saddle safe saffron sage sailor saint salad salary salmon salon salt salute same sample sand sandal satin
sauce saucer save savour scale scan scarce scarf scarlet scenic school science scoop scope score scout
scrap screen screw script scroll scrub seal search season seat second secret section secure seed seek seem
select self send senior sense series serve session settle seven several severe shade shadow shaft shake
shape share shark sharp shed sheep sheet shelf shell shelter shield shift shine ship shirt shiver shoe
shop short should shout shovel show shower shrimp shrink shrub shuffle shut side sieve sigh sight sign
signal silent silk silver similar simple since sing single sink sister site sixty size skate sketch skill
skin skirt skull slate sleep sleeve slender slice slide slight slim slope slot slow small smart smile
smoke smooth snack snail snake snap sneeze snow soap soccer social sock soda sofa soft soil solar soldier
solid solo solve song soon sort sound soup source south space spade spare spark sparrow speak spear speech
speed spell spend spice spider spike spin spinach spiral spirit splash split sponge spoon sport spot spray
spread spring sprout spruce square squash squeeze stable stack staff stage stain stamp stand star start
state station statue stay steady steak steam steep stem step stereo stew stick still sting stitch stock
stone stool stop storage store storm story stove straw stream street strike string strip stroke strong
student studio study stuff stumble style submit subtle suburb success such sudden sugar suit sultana
summer summit sunday sunny sunset super supper supply surf surface surge survey swallow swamp swan swap
swear sweep sweet swift swim swing switch symbol symptom syrup system table tackle tailor take talent talk
tall tame tango tank tape target tart task taste taxi teach team tell temper temple tenant tender tennis
tent term test text thank that theatre theme then theory thick thigh thin thing think third thirst thirty
thistle thorn thread three thrive throat throne through throw thrush thumb thunder thyme ticket tidy tiger
tight tile timber time timid tiny tissue title toad toast today toffee toilet token tomato tone tongue
tool tooth topic torch tornado total touch tough tour toward towel tower town trace track trade traffic
trail train travel tray treat tree trend trial tribe trim trip trophy trot trout truck true trunk trust
truth tube tuesday tulip tumble tuna tunnel turbine turkey turn turnip turtle tutor tweed twelve twenty
twice twig twin twist type uncle under unfold unhappy union unique unit unite unity unknown until update
upon upper urban urge urgent useful usual utility vacant vacuum vague valid valley value valve vanilla
vanish vapour vast vault veal vehicle veil velvet vendor venue verb verify version very vessel viaduct
vibrant video view village vine vintage viola violet violin virtue visa vision visit visual vital vivid
vocal voice void volcano volume vote voyage vulture wafer wage wagon wake walk wall wallet walnut walrus
want ward warm warn wash wasp watch water wave wealth weasel weave wedge welcome well west whale wharf
wheat wheel when whip whisper white wick wide width wife wild will willow wind window wine wing winner
winter wipe wire wisdom wise wish witness wolf woman wombat wonder wooden wool word work world worth wrap
wreath wren wrist yacht yard yarn yawn year yeast yellow yoga yogurt young youth zebra zero zigzag zinc
zone
`

export const phraseWords: readonly string[] = text.trim().split(/\s+/)
