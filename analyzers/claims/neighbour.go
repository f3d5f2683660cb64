package claims

import (
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
)

// Neighbour is what a key beside a value says about it.
type Neighbour struct {
	Stem string // the orientation that it speaks of, as in Name; "" for whatever stands beside it

	Form     convention.Form // type: quaternion
	Scalar   convention.ScalarPlace
	Unit     convention.Unit
	Angular  bool // the unit is that of angles by its name, wherever it stands
	Storage  convention.Storage
	Product  convention.Product
	Hand     convention.Hand
	Sequence string // text for SequenceIn
	Explicit bool   // the key speaks of a sequence or order
	AxisKind string // moving, fixed and the like, if the text is that word alone
	Roles    [3]angle.Role
	To, From string // names of frames, v_To = R v_From
}

// neighbourWords are the last words of keys that tell about others.
var neighbourWords = map[string]func(n *Neighbour, value string){
	"unit": readUnit, "units": readUnit,
	"order": readOrder, "sequence": readOrder, "seq": readOrder, "convention": readConvention, "axes": readConvention,
	"type": readForm, "format": readForm, "representation": readForm, "parametrization": readForm, "parameterization": readForm,
	"storage": readStorage, "layout": readStorage, "major": readStorage,
	"handedness": readHand, "hand": readHand, "chirality": readHand,
	"product": readProduct, "algebra": readProduct,
}

// neighbourFillers are words of such keys that name what is told about.
const neighbourFillers = euler | rotation | angleWord | quaternion | matrixWord | orientation | storage | scalarOrder | generic | axes | role

// Neighbour reads a key of this name with its text. It reports false for a key
// that tells nothing about others.
func (k *Name) Neighbour(value string) (Neighbour, bool) {
	var n Neighbour
	if len(k.words) == 0 || len(value) > 200 {
		return n, false
	}
	if n.frames(k.words, value) || n.flags(k, value) {
		return n, true
	}
	last := len(k.words) - 1
	read := neighbourWords[k.words[last].text]
	if read == nil {
		return n, false
	}
	var stem []string
	for _, w := range k.words[:last] {
		if w.text == "angular" || lexicon[w.text]&(angleWord|euler|rotation) != 0 {
			n.Angular = true
		} else if lexicon[w.text]&neighbourFillers == 0 {
			stem = append(stem, w.text)
		}
	}
	n.Stem = strings.Join(stem, "_")
	read(&n, value)
	return n, true
}

func readUnit(n *Neighbour, value string) { n.Unit = UnitIn(value) }

func readOrder(n *Neighbour, value string) {
	readConvention(n, value)
	n.Explicit = true
	if n.Sequence != "" {
		n.Sequence = "sequence " + value
	}
}

func readConvention(n *Neighbour, value string) {
	words := wordsOf(value)
	n.Scalar = one(words, scalarPhrases)
	n.Storage = one(words, storagePhrases)
	n.Product = one(words, productPhrases)
	n.Hand = one(words, handPhrases)
	n.Roles, _ = rolesIn(words)
	if n.Storage == convention.StorageUnstated && n.Scalar == convention.ScalarUnstated {
		n.Sequence = "convention " + value
	}
	if len(words) == 1 && lexicon[words[0]]&axisKind != 0 {
		n.AxisKind = words[0]
	}
}

func readForm(n *Neighbour, value string) {
	words := wordsOf(value)
	n.Form = one(words, formPhrases)
	n.Scalar = one(words, scalarPhrases)
	n.Unit = UnitIn(value)
	n.Roles, _ = rolesIn(wordsOf(value))
	n.Sequence = strings.Join(wordsOf(value), " ")
}

func readStorage(n *Neighbour, value string) {
	n.Storage = one(append(wordsOf(value), "major"), storagePhrases)
	if n.Storage == convention.StorageUnstated {
		n.Storage = one(wordsOf(value), storagePhrases)
	}
}

func readHand(n *Neighbour, value string) {
	n.Hand = one(append(wordsOf(value), "hand"), handPhrases)
	if n.Hand == convention.HandUnstated {
		n.Hand = one(wordsOf(value), handPhrases)
	}
}

func readProduct(n *Neighbour, value string) { n.Product = one(wordsOf(value), productPhrases) }

// wordsOf splits a text as names are split, in lower case.
func wordsOf(text string) []string {
	var words []string
	for _, w := range split(text) {
		words = append(words, w.text)
	}
	return words
}

// flags reads degrees: true, radians: false, scalar_first: true.
func (n *Neighbour) flags(k *Name, value string) bool {
	yes := value == "true" || value == "True" || value == "yes"
	if !yes && value != "false" && value != "False" && value != "no" {
		return false
	}
	first, last := convention.ScalarFirst, convention.ScalarLast
	deg, rad := convention.Degree, convention.Radian
	if !yes {
		first, last, deg, rad = last, first, rad, deg
	}
	switch text := joined(k.words); {
	case text == "scalar first":
		n.Scalar = first
	case text == "scalar last":
		n.Scalar = last
	case k.any(degree) && !k.any(radian):
		n.Unit = deg
	case k.any(radian) && !k.any(degree):
		n.Unit = rad
	default:
		return false
	}
	return true
}

// frames reads the keys that name the two frames of a transform. In tf2 and in
// URDF parent coordinates come from child coordinates, v_parent = R v_child
// (REP 105 and the URDF joint element, from memory); the target frame of a
// lookup is the one that coordinates go to.
func (n *Neighbour) frames(words []word, value string) bool {
	if value == "" || len(words) > 3 || lexicon[words[0].text]&leadsFrames == 0 {
		return false
	}
	switch joined(words) {
	case "frame id", "header frame id", "parent", "parent frame", "parent frame id", "parent link", "to frame", "target frame", "to":
		n.To = value
	case "child frame id", "child", "child frame", "child link", "from frame", "source frame", "from":
		n.From = value
	default:
		return false
	}
	return true
}

// joined is the words with spaces between them.
func joined(words []word) string {
	text := words[0].text
	for _, w := range words[1:] {
		text += " " + w.text
	}
	return text
}
