package angle

import (
	"fmt"
	"slices"
	"strings"
)

// word is one token: letters or digits, with the primes behind each letter.
type word struct {
	text   string
	primes []int // per letter; nil without any
}

// A parser gathers what the words of a label say. Letters may come one by one
// (z-y-x) or together (zyx); loose holds the ones that are not yet three.
type parser struct {
	statement
	loose  string
	primes []int
}

// parse reads the words of a label.
func parse(text string) (statement, error) {
	p := parser{}
	for words := split(text); len(words) > 0; {
		used, err := p.take(words)
		if err != nil {
			return p.statement, err
		}
		words = words[used:]
	}
	if p.loose != "" {
		return p.statement, fmt.Errorf("%w: %q does not have three axes", ErrSequence, p.loose)
	}
	if p.order == nil && p.names == nil {
		return p.statement, ErrNoSequence
	}
	if p.moving && p.fixed {
		return p.statement, fmt.Errorf("%w: it says both moving and fixed axes", ErrSequence)
	}
	return p.statement, nil
}

// take reads the first word, or several that belong together, and reports how many.
func (p *parser) take(words []word) (used int, err error) {
	w := words[0]
	if isAxes(w.text) {
		return 1, p.axes(w)
	}
	if letters, ok := turnNames[w.text]; ok {
		return 1, p.axes(word{text: letters})
	}
	if len(w.text) == 4 && isAxes(w.text[1:]) && strings.ContainsRune("rs", rune(w.text[0])) {
		p.kind(w.text[0] == 's') // static or rotating, as in sxyz
		return 1, p.axes(word{text: w.text[1:]})
	}
	if fixed, ok := kinds[w.text]; ok {
		p.kind(fixed)
		return 1, nil
	}
	if fixed, ok := bearers[w.text]; ok {
		return p.bearer(fixed, words), nil
	}
	if fillers[w.text] {
		return 1, nil
	}
	return 0, fmt.Errorf("%w: unknown word %q", ErrNoSequence, w.text)
}

// bearer reads who bears the axes. Body-fixed axes are a kind of axes; a
// body-fixed frame, or the body alone, says nothing about turns.
func (p *parser) bearer(fixed bool, words []word) (used int) {
	next := func(k int, any ...string) bool { return k < len(words) && slices.Contains(any, words[k].text) }
	switch {
	case next(1, "fixed") && next(2, "frame", "frames"):
		return 3
	case next(1, "fixed", "axes", "axis"):
		p.kind(fixed)
		return 2
	}
	return 1
}

func (p *parser) kind(fixed bool) {
	if fixed {
		p.fixed = true
	} else {
		p.moving = true
	}
}

// axes takes up letters x y z, digits 1 2 3, or letters R P Y for names.
func (p *parser) axes(w word) error {
	p.loose += w.text
	if w.primes == nil {
		w.primes = make([]int, len(w.text))
	}
	p.primes = append(p.primes, w.primes...)
	if len(p.loose) < 3 {
		return nil
	}
	letters, primes := p.loose, p.primes
	p.loose, p.primes = "", nil
	order, names, ok := orderOf(letters)
	if !ok {
		return fmt.Errorf("%w: %q; three axes are needed, none twice in a row", ErrSequence, letters)
	}
	if names {
		return setOrder(&p.names, order)
	}
	switch primed := primes[1] > 0; {
	case primed && primes[0] <= primes[1] && primes[1] <= primes[2]:
		p.kind(false)
	case primed || primes[0] > 0:
		return fmt.Errorf("%w: primes count the turns made before, as in z-y'-x''", ErrSequence)
	} // primes on the third letter alone are quotation marks
	return setOrder(&p.order, order)
}

// orderOf reads three letters x y z, digits 1 2 3 or names r p y; in names
// from words w stands for yaw.
func orderOf(letters string) (order [3]Axis, names, ok bool) {
	alphabets := []string{"xyz", "123", "rpw", "rpy"}
	for _, alphabet := range alphabets {
		if strings.Trim(letters, alphabet) != "" || len(letters) != 3 {
			continue
		}
		for k := range order {
			order[k] = Axis(strings.IndexByte(alphabet, letters[k]))
		}
		names = alphabet[0] == 'r'
		ok = Sequence{Axes: order}.Valid() && !(names && order[0] == order[2])
		return order, names, ok
	}
	return order, false, false
}

// isAxes reports whether text is made of axis letters, of digits, or of r, p and y.
func isAxes(text string) bool {
	for _, alphabet := range []string{"xyz", "123", "rpy"} {
		if text != "" && len(text) <= 3 && strings.Trim(text, alphabet) == "" {
			return true
		}
	}
	return false
}

// setOrder keeps an order, unless another one has been stated.
func setOrder(kept **[3]Axis, order [3]Axis) error {
	if *kept != nil && **kept != order {
		return fmt.Errorf("%w: it names two different orders", ErrSequence)
	}
	*kept = &order
	return nil
}
