package claims

import (
	"regexp"
	"strings"

	"dextral/core/angle"
)

var (
	// sequenceToken is a token that can only be a sequence of axes.
	sequenceToken = regexp.MustCompile(`^([XYZ]{3}|[xyzXYZ]['\x{2032}]*-[xyzXYZ]['\x{2032}\x{2033}]*-[xyzXYZ]['\x{2032}\x{2033}]*|[123]-[123]-[123]|[rs][xyz]{3})$`)
	// looseToken is a token that is one if the words around it speak of sequences.
	looseToken = regexp.MustCompile(`^([xyz]{3}|[123]{3})$`)
	// about are such words.
	about = regexp.MustCompile(`(?i)^(euler|order|sequence|seq|convention|intrinsic|extrinsic|moving|fixed|axes|rotating|static|rotations?|tait-bryan|cardan)$`)
)

// maxLabel is the number of words in the longest label looked for: "roll, pitch,
// yaw about the fixed axes x-y-z" has eight.
const maxLabel = 9

// SequenceIn finds a label of an angle sequence in running text: the longest run
// of words that angle.ParseLabel takes and that names axes or their kind. Names
// of the numbers alone (roll, pitch, yaw) are no sequence. Of two different
// sequences neither is taken; a full label goes before a bare one that agrees.
func SequenceIn(text string, roles [3]angle.Role) (angle.Label, bool) {
	tokens := strings.FieldsFunc(text, func(r rune) bool { return strings.ContainsRune(" \t,;:.()[]{}\"/=", r) })
	tokens = tokens[:min(len(tokens), 60)]
	var best angle.Label
	found := false
	for from := 0; from < len(tokens); from++ {
		for to := min(len(tokens), from+maxLabel); to > from; to-- {
			label, ok := labelOf(tokens[from:to], roles)
			if !ok {
				continue
			}
			if found && !label.Same(best) && (label.Full == best.Full || !Compatible(label, best)) {
				return angle.Label{}, false
			}
			if !found || label.Full && !best.Full {
				best, found = label, true
			}
			from = to - 1
			break
		}
	}
	return best, found
}

func labelOf(tokens []string, roles [3]angle.Role) (angle.Label, bool) {
	certain, loose, context := false, false, false
	for _, t := range tokens {
		certain = certain || sequenceToken.MatchString(t)
		loose = loose || looseToken.MatchString(t)
		context = context || about.MatchString(t)
	}
	if !certain && !context {
		return angle.Label{}, false
	}
	label, err := angle.ParseLabel(strings.Join(tokens, " "), roles)
	return label, err == nil && (label.Full || certain || loose)
}

// Compatible reports whether two labels can both be meant: they share a reading.
func Compatible(a, b angle.Label) bool {
	for _, r := range a.Readings {
		if b.Means(r) {
			return true
		}
	}
	return false
}
