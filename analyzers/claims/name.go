package claims

import (
	"strings"
	"sync"
	"sync/atomic"

	"dextral/core/angle"
	"dextral/core/convention"
)

// Name is what a name says about the numbers that it stands over.
type Name struct {
	Text string // as written
	Stem string // which orientation: the words of neither representation nor convention, joined by _
	Not  string // what the numbers are instead of an orientation; "" if the name does not say
	Deep bool   // Not holds for everything below this name too

	Scalar    convention.ScalarPlace
	Unit      convention.Unit
	Storage   convention.Storage
	Product   convention.Product
	Hand      convention.Hand
	Direction convention.Direction // of words such as cam_to_body, by common practice v_body = R v_cam
	Roles     [3]angle.Role        // of three numbers, such as rpy
	Sequence  string               // a label for angle.ParseLabel; "" if there is none
	BadUnit   string               // a unit of angles that is not read

	words []word
	tags  tag
	sym   byte // R, T or q: the customary letter; 0 if there is none
}

// known are names that have been read: a tree uses few of them, in many files. Past
// mostKnown each further name is read anew.
var (
	known    sync.Map // string -> *Name
	numKnown atomic.Int64
)

const mostKnown = 1 << 14

// Read takes a name apart. The result is shared; it must not be changed.
func Read(name string) *Name {
	if n, ok := known.Load(name); ok {
		return n.(*Name)
	}
	n := read(name)
	if numKnown.Add(1) <= mostKnown {
		known.Store(strings.Clone(name), n)
	}
	return n
}

func read(name string) *Name {
	n := &Name{Text: name, words: split(name)}
	for _, w := range n.words {
		n.tags |= lexicon[w.text]
	}
	n.readSymbol()
	n.readStem()
	n.readNot()
	n.readTerms()
	n.readDirection()
	return n
}

// ReadIn takes a name apart that stands in something with a name of its own.
// Where it says too little by itself (data, value, matrix, map, angles) both are
// read as one; the stem is that of the inner name in any case.
func ReadIn(outer, name string) *Name {
	n := Read(name)
	if outer == "" {
		return n
	}
	const little = generic | matrixWord | mapping | angleWord | vector | degree | radian | scalarOrder
	for _, w := range n.words {
		if lexicon[w.text]&little == 0 {
			return n
		}
	}
	both := *Read(outer + "." + name)
	both.Stem = n.Stem
	return &both
}

// readSymbol finds a customary letter: R, T or q at the head, or with a frame on
// either side (body_T_cam0). Case matters: r, t and Q are other things.
func (n *Name) readSymbol() {
	for i, w := range n.words {
		if i > 1 || i == 1 && len(n.words) < 3 {
			return
		}
		switch {
		case w.raw == "R" || w.raw == "T" || w.raw == "q":
			n.sym = w.raw[0]
		case w.raw == "Tr" && i == 0:
			n.sym = 'T'
		case i == 0 && len(w.raw) == 2 && strings.ContainsRune("RTq", rune(w.raw[0])) && w.raw[1] >= '0' && w.raw[1] <= '9':
			n.sym = w.raw[0]
		default:
			continue
		}
		return
	}
}

// readStem joins the words that tell which orientation it is. The word extrinsic
// is one of them unless it says about which axes the turns are.
func (n *Name) readStem() {
	var stem []string
	for i, w := range n.words {
		t := lexicon[w.text]
		isSymbol := n.sym != 0 && w.raw[0] == n.sym && len(w.raw) <= 2 && i <= 1
		if isSymbol && len(w.raw) == 2 && w.raw != "Tr" {
			stem = append(stem, w.raw[1:])
		} else if !isSymbol && (t&representation == 0 || t&rigid != 0 && n.tags&letters3 == 0) {
			stem = append(stem, w.text)
		}
	}
	n.Stem = strings.Join(stem, "_")
}

// readNot finds words that say that this is no orientation.
func (n *Name) readNot() {
	if len(n.words) == 1 || len(n.words) == 2 && lexicon[n.words[1].text] == 0 {
		if why := notSymbols[strings.TrimRight(n.words[0].raw, "0123456789")]; why != "" { // P1, P2
			n.Not = why
			return
		}
	}
	about := ""
	for _, w := range n.words {
		if lexicon[w.text]&(representation&^rotation|linking) == 0 {
			about = w.text
		}
	}
	for _, w := range n.words {
		t := lexicon[w.text]
		if n.Not == "" && (t&not != 0 || t&headNot != 0 && (w.text == about || w.text == n.Stem)) {
			n.Not = notWhy[w.text]
		}
		n.Deep = n.Deep || t&deepNot != 0 && (w.text == about || n.any(mapping)) // rc_map: {roll: 1}
	}
	if n.Not != "" {
		return
	}
	if n.tags&camera != 0 && n.tags&matrixWord != 0 && n.tags&(rotation|orientation|dcm|transform|rigid|mounting) == 0 {
		n.Not = "a camera matrix"
	}
}

// readTerms reads units, orders and the like.
func (n *Name) readTerms() {
	switch {
	case n.tags&degree != 0 && n.tags&radian == 0:
		n.Unit = convention.Degree
	case n.tags&radian != 0 && n.tags&degree == 0:
		n.Unit = convention.Radian
	}
	var texts []string
	for _, w := range n.words {
		texts = append(texts, w.text)
		if lexicon[w.text]&otherUnit != 0 {
			n.BadUnit = w.text
		}
	}
	if n.any(phrase) {
		n.Scalar = one(texts, scalarPhrases)
		n.Storage = one(texts, storagePhrases)
		n.Product = one(texts, productPhrases)
		n.Hand = one(texts, handPhrases)
	}
	n.readAngles(texts)
}

// readAngles reads the names of three angles, and a sequence.
func (n *Name) readAngles(texts []string) {
	var label []string
	for _, w := range n.words {
		if lexicon[w.text]&(letters3|axisKind) != 0 || digits3(w.text) {
			label = append(label, w.text)
		}
	}
	n.Roles, _ = rolesIn(texts)
	if n.tags&(euler|angleWord|role) != 0 {
		n.Sequence = strings.Join(label, " ")
	}
}

// digits3 reports a sequence in digits, such as 321.
func digits3(s string) bool {
	return len(s) == 3 && strings.Trim(s, "123") == "" && s[0] != s[1] && s[1] != s[2]
}

// readDirection reads cam_to_body and body_from_cam.
func (n *Name) readDirection() {
	at := -1
	for i, w := range n.words {
		if lexicon[w.text]&linking != 0 {
			if at >= 0 {
				return // two of them: no telling
			}
			at = i
		}
	}
	if at < 0 {
		return
	}
	left, right := n.frameName(n.words[:at]), n.frameName(n.words[at+1:])
	d := convention.Direction{To: right, From: left}
	if n.words[at].text == "from" {
		d = d.Reverse()
	}
	if d.Stated() {
		n.Direction = d
	}
}

// frameName joins the words that may name a frame, as written.
func (n *Name) frameName(words []word) string {
	var parts []string
	for i, w := range words {
		isSymbol := n.sym != 0 && len(w.raw) <= 2 && w.raw[0] == n.sym && i == 0
		if lexicon[w.text]&(representation|rigid) == 0 && !isSymbol {
			parts = append(parts, w.raw)
		}
	}
	return strings.Join(parts, "_")
}

// SubscriptFrames reads the two frames of T_a_b, R_a_b, q_a_b and a_T_b in
// written order. Which of them the coordinates come from is for the reader to
// find out: teams differ.
func SubscriptFrames(name string) (first, second string, ok bool) {
	n := Read(name)
	if n.sym == 0 || n.Direction.Stated() || len(n.words) != 3 {
		return "", "", false
	}
	if lexicon[n.words[0].text]&representation == 0 && n.words[1].raw == string(n.sym) {
		return n.words[0].raw, n.words[2].raw, true
	}
	return n.words[1].raw, n.words[2].raw, n.words[0].raw == string(n.sym)
}
