package rules

import (
	"embed"
	"slices"
	"strings"
)

// Rule is one entry of the catalogue. What a rule does stands in the file of
// its subject; what it means to a reader stands in the page of its name.
type Rule struct {
	Name    string // lower case, words joined by hyphens
	Summary string // one sentence: the contradiction
	Level   Level  // the worst level it reports
}

// The names of the rules, as constants so that a misspelling does not compile.
const (
	MirroredRotation      = "mirrored-rotation"
	LeftHandedTriad       = "left-handed-triad"
	MirroringAxisMap      = "mirroring-axis-map"
	RotorNotUnit          = "rotor-not-unit"
	OrientationUnset      = "orientation-unset"
	FirstOrderAngles      = "first-order-angles"
	AxisNotUnit           = "axis-not-unit"
	MatrixNotOrthonormal  = "matrix-not-orthonormal"
	FrameOfTwoHands       = "frame-of-two-hands"
	BottomRowWrong        = "bottom-row-wrong"
	AngleBeyondTurn       = "angle-beyond-turn"
	AngleOutOfRange       = "angle-out-of-range"
	GimbalLocked          = "gimbal-locked"
	MessageMalformed      = "message-malformed"
	RatesDiffer           = "rates-differ"
	NotFinite             = "not-finite"
	SignJump              = "sign-jump"
	NormLoss              = "norm-loss"
	StampsNotIncreasing   = "stamps-not-increasing"
	OrientationJump       = "orientation-jump"
	StaleRows             = "stale-rows"
	GimbalLock            = "gimbal-lock"
	GyroDisagrees         = "gyro-disagrees"
	ConventionChanges     = "convention-changes"
	SequenceMislabelled   = "sequence-mislabelled"
	MovingFixedSwapped    = "moving-fixed-swapped"
	ScalarMisplaced       = "scalar-misplaced"
	DirectionReversed     = "direction-reversed"
	AngleUnitWrong        = "angle-unit-wrong"
	StorageTransposed     = "storage-transposed"
	HalfAngle             = "half-angle"
	AngleSignReversed     = "angle-sign-reversed"
	ParametersMistaken    = "parameters-mistaken"
	AxesSwapped           = "axes-swapped"
	RepresentationsDiffer = "representations-differ"
	StatedTwice           = "stated-twice"
	InversePairBroken     = "inverse-pair-broken"
	LoopOpen              = "loop-open"
	ParentCycle           = "parent-cycle"
	ChildOfTwo            = "child-of-two"
	ClaimsConflict        = "claims-conflict"
	SingularPoint         = "singular-point"
	WrongTerm             = "wrong-term"
	FunctionMislabelled   = "function-mislabelled"
	MirroringFunction     = "mirroring-function"
	LongWayRound          = "long-way-round"
	RoundTripBroken       = "round-trip-broken"
	RoutesDiffer          = "routes-differ"
	ConventionsMixed      = "conventions-mixed"
	NormNotKept           = "norm-not-kept"
	ArgumentIdle          = "argument-idle"
	ReceiverChanged       = "receiver-changed"
	WaiverExpired         = "waiver-expired"
	WaiverUnused          = "waiver-unused"
	WaiverTooBroad        = "waiver-too-broad"
)

var catalogue = []Rule{
	{MirroredRotation, "A matrix that claims to be a rotation has determinant -1.", Error},
	{LeftHandedTriad, "Three axes that claim to form a right-handed triad form a left-handed one.", Error},
	{MirroringAxisMap, "A map between the axes of two right-handed frames has determinant -1.", Error},
	{RotorNotUnit, "A quaternion that claims to be a rotation is not of unit norm.", Error},
	{OrientationUnset, "All numbers of an orientation are zero: it looks unset.", Note},
	{AxisNotUnit, "A vector that claims to be a unit axis is not of unit length.", Error},
	{MatrixNotOrthonormal, "A matrix that claims to be a rotation is not orthonormal.", Error},
	{FirstOrderAngles, "A matrix that claims to be a rotation is the identity plus small angles to first order.", Note},
	{FrameOfTwoHands, "The axes of one frame are stated twice, once right-handed and once left-handed.", Error},
	{BottomRowWrong, "The last row of a 4x4 that claims to be a rigid transform is not 0 0 0 1.", Error},
	{AngleBeyondTurn, "An angle stated in radians is several turns, and a round number of degrees.", Warning},
	{AngleOutOfRange, "An angle lies outside the range that is stated for it.", Error},
	{GimbalLocked, "Three angles are at gimbal lock, where only a sum or difference of two is determined.", Note},
	{MessageMalformed, "An attitude message breaks a rule of the standard that its version names.", Error},
	{RatesDiffer, "Two statements of one angular rate differ.", Error},
	{NotFinite, "An orientation contains a number that is not finite.", Error},
	{SignJump, "A logged rotor jumps from R to -R while the rotation barely moves.", Warning},
	{NormLoss, "A logged quaternion loses its unit norm.", Warning},
	{StampsNotIncreasing, "The time stamps of an attitude log stand still or run backwards.", Warning},
	{OrientationJump, "A logged orientation jumps as it turns nowhere else.", Warning},
	{StaleRows, "A logged orientation stands still for many rows and then catches up at once.", Warning},
	{GimbalLock, "A logged pitch comes so near a right angle that roll and yaw lose their meaning.", Warning},
	{GyroDisagrees, "The angular rates of a log are those of its orientations only in another convention than stated.", Error},
	{ConventionChanges, "From some row on a log obeys another convention than before.", Error},
	{SequenceMislabelled, "Angles and a twin value agree only if the turns are taken in another order than stated.", Error},
	{MovingFixedSwapped, "Angles and a twin value agree only if the turns are about fixed axes instead of moving ones, or the reverse.", Error},
	{ScalarMisplaced, "A quaternion and a twin value agree only if its scalar stands at the other end.", Error},
	{DirectionReversed, "Two values of one orientation agree only if one of them maps the other way.", Error},
	{AngleUnitWrong, "Angles and a twin value agree only in another unit than stated.", Error},
	{StorageTransposed, "A flat matrix is stored the other way than stated.", Error},
	{HalfAngle, "Two values of one orientation agree only if one of them is taken at half or twice its angle.", Error},
	{AngleSignReversed, "Angles and a twin value agree only if one angle changes its sign.", Error},
	{ParametersMistaken, "Three numbers and a twin value agree only if they are another kind of parameters than stated.", Error},
	{AxesSwapped, "Two values of one orientation agree only after an exchange of axes.", Error},
	{RepresentationsDiffer, "Two values that state the same orientation differ, and no customary reading reconciles them.", Error},
	{StatedTwice, "The orientation between two frames is stated twice with different values.", Error},
	{InversePairBroken, "Two values that ought to be the inverse of each other are not.", Error},
	{LoopOpen, "Orientations around a loop of frames do not come back to where they began.", Error},
	{ParentCycle, "A frame is its own ancestor in a tree of parents and children.", Warning},
	{ChildOfTwo, "A frame has two parents in a tree of parents and children.", Warning},
	{ClaimsConflict, "Two stated claims about one value contradict each other.", Error},
	{SingularPoint, "A function on rotations fails where its formula is singular.", Warning},
	{WrongTerm, "A function nearly computes the operation that it is called, but for a term, a component or a branch.", Error},
	{FunctionMislabelled, "A function computes another convention than its name, comment or parameters say.", Error},
	{MirroringFunction, "A function that is to rotate, or to change between right-handed frames, mirrors.", Error},
	{LongWayRound, "A function of two rotations gives something else for R and -R.", Warning},
	{RoundTripBroken, "Two conversions that ought to undo each other do not.", Warning},
	{RoutesDiffer, "Two ways of a package to the same result lead to different rotations.", Warning},
	{ConventionsMixed, "A function stores a quaternion otherwise than the rest of its package.", Warning},
	{NormNotKept, "A function is right for unit quaternions only, or leaves them, and does not say so.", Warning},
	{ArgumentIdle, "A function on rotations does not depend on one of its arguments.", Note},
	{ReceiverChanged, "A method that reads like a getter changes the rotation that it is called on.", Warning},
	{WaiverExpired, "A waiver has passed its last day.", Warning},
	{WaiverUnused, "A waiver matches no finding.", Warning},
	{WaiverTooBroad, "A waiver accepts more than somebody can have looked at.", Warning},
}

// Catalogue lists all rules in the order in which they are documented.
func Catalogue() []Rule { return slices.Clone(catalogue) }

// Names lists the names of all rules, in the order of Catalogue.
func Names() []string {
	names := make([]string, len(catalogue))
	for i, r := range catalogue {
		names[i] = r.Name
	}
	return names
}

// Lookup finds a rule by name.
func Lookup(name string) (Rule, bool) {
	i := slices.IndexFunc(catalogue, func(r Rule) bool { return r.Name == name })
	if i < 0 {
		return Rule{}, false
	}
	return catalogue[i], true
}

//go:embed pages/*.md
var pages embed.FS

// Page returns the rule's page in Markdown: the claim it tests, the evidence it
// computes, a worked contradiction, when it stays silent, the remedy.
func (r Rule) Page() string {
	text, err := pages.ReadFile("pages/" + r.Name + ".md")
	if err != nil {
		return ""
	}
	return strings.TrimSpace(string(text)) + "\n"
}
