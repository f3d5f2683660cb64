package main

import (
	"errors"
	"fmt"
	"maps"
	"slices"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/tolerance"
	"dextral/rules"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

// exitUndecided says that numbers cannot decide.
const exitUndecided = 3

func identifyCommand(s streams) *cobra.Command {
	var in given
	c := &cobra.Command{
		Use:   "identify [file]",
		Short: "Say which conventions reconcile two statements of one orientation",
		Long: `Identify compares two or more statements of one orientation and prints the readings
of their conventions that reconcile them, fewest changes first, each with what it
leaves open. The numbers come from flags, or from a file: the values that state one
orientation there, or those whose keys --key names. Of a log with angular rates it
says which conventions its orientations and rates obey.

What is not stated is free. Digits count: 0.5 leaves more open than 0.5000.

Exit status: 0 the statements agree as stated, 1 they do not, 2 they could not be
read, 3 the numbers cannot decide.`,
		Example: `  dextral identify --quaternion "0.3826834 0 0 0.9238795" --angles "45 0 0" --sequence z-y\'-x\'\' --unit deg
  dextral identify --quaternion "0.5 -0.5 0.5 -0.5" --matrix "0 0 1  -1 0 0  0 -1 0" --scalar first
  dextral identify calib/mount.yaml --key mount.quaternion --key mount.rpy_deg
  dextral identify flight.csv`,
		Args: cobra.MaximumNArgs(1),
		RunE: func(c *cobra.Command, args []string) error {
			values, err := in.values()
			switch {
			case err != nil:
				return err
			case len(args) == 1 && len(values) > 0:
				return errors.New("give numbers in flags or a file, not both")
			case len(args) == 0 && len(values) < 2:
				return errors.New("two statements of one orientation are needed, such as --quaternion and --angles; see dextral identify --help")
			case len(args) == 0:
				return compare(s, values)
			}
			return in.file(c, s, args[0])
		},
	}
	f := c.Flags()
	f.StringArrayVar(&in.quaternions, "quaternion", nil, "four numbers")
	f.StringArrayVar(&in.matrices, "matrix", nil, "nine numbers, row by row")
	f.StringArrayVar(&in.angles, "angles", nil, "three angles")
	f.StringArrayVar(&in.vectors, "rotation-vector", nil, "three numbers, axis times angle")
	f.StringVar(&in.scalar, "scalar", "", "where the quaternions have their scalar: first or last")
	f.StringVar(&in.sequence, "sequence", "", "sequence of the angles, as in z-y'-x'', 321, rpy")
	f.StringVar(&in.unit, "unit", "", "unit of angles and rotation vectors: deg or rad")
	f.StringVar(&in.time, "time", "", "column of time stamps of a log")
	f.StringArrayVar(&in.keys, "key", nil, "keys of the values in the file to compare")
	return c
}

// given holds the flags.
type given struct {
	quaternions, matrices, angles, vectors, keys []string
	scalar, sequence, unit, time                 string
}

// values makes values of the flags, with what the flags claim as comments would.
func (g *given) values() ([]*rules.Value, error) {
	scalar, err := choose("--scalar", g.scalar, map[string]convention.Term{"first": convention.ScalarFirst, "last": convention.ScalarLast})
	if err != nil {
		return nil, err
	}
	unit, err := choose("--unit", g.unit, map[string]convention.Term{"deg": convention.Degree, "rad": convention.Radian})
	if err != nil {
		return nil, err
	}
	var sequence convention.Term
	if g.sequence != "" {
		label, err := angle.ParseLabel(g.sequence, [3]angle.Role{})
		if err != nil {
			return nil, fmt.Errorf("--sequence: %w", err)
		}
		sequence = label
	}
	var values []*rules.Value
	for _, group := range []struct {
		flag  string
		form  convention.Form
		count int
		texts []string
		says  []convention.Term
	}{
		{"--quaternion", convention.Quaternion, 4, g.quaternions, []convention.Term{scalar}},
		{"--matrix", convention.Rotation, 9, g.matrices, []convention.Term{convention.RowMajor}},
		{"--angles", convention.Angles, 3, g.angles, []convention.Term{sequence, unit}},
		{"--rotation-vector", convention.RotationVector, 3, g.vectors, []convention.Term{unit}},
	} {
		for i, text := range group.texts {
			v, err := statement(group.flag, group.form, group.count, text)
			if err != nil {
				return nil, err
			}
			if len(group.texts) > 1 {
				v.Key = fmt.Sprintf("%s %d", v.Key, i+1)
			}
			for _, says := range append(group.says, group.form) {
				if says != nil {
					v.Claims = append(v.Claims, rules.Claim{Says: says, Source: rules.Comment})
				}
			}
			values = append(values, v)
		}
	}
	return values, nil
}

func choose(flag, word string, words map[string]convention.Term) (convention.Term, error) {
	if word == "" {
		return nil, nil
	}
	if t, ok := words[word]; ok {
		return t, nil
	}
	return nil, fmt.Errorf("%s %s: it may be %s", flag, word, strings.Join(slices.Sorted(maps.Keys(words)), " or "))
}

// statement reads the numbers of one flag.
func statement(flag string, form convention.Form, count int, text string) (*rules.Value, error) {
	v := &rules.Value{Form: form, Key: strings.TrimPrefix(flag, "--")}
	for _, word := range strings.FieldsFunc(text, func(r rune) bool { return strings.ContainsRune(" ,;[]()\t\n", r) }) {
		n, ok := tolerance.Read(word)
		if !ok {
			return nil, fmt.Errorf("%s %q: %q is no finite number", flag, text, word)
		}
		v.Numbers = append(v.Numbers, rules.Number{Text: word, Value: n.Value})
	}
	if len(v.Numbers) != count {
		return nil, fmt.Errorf("%s %q: %d numbers are needed, there are %d", flag, text, count, len(v.Numbers))
	}
	if count == 9 {
		v.Rows, v.Cols = 3, 3
	}
	return v, nil
}

// file compares the values of a file that state one orientation.
func (g *given) file(c *cobra.Command, s streams, path string) error {
	if done, err := identifyLog(c.Context(), s, path, g.time); done {
		return err
	}
	r, err := audit.Run(c.Context(), audit.Options{Paths: []string{path}, Today: time.Now()})
	if err != nil {
		return err
	}
	if len(r.Report.Failed) > 0 {
		_ = report.Summary(s.err, &r.Report, layout(s.err)) // the status says that it failed
		return status(exitFailed)
	}
	groups := groupsOf(r.Values, g.keys)
	if len(groups) == 0 {
		if len(g.keys) > 0 {
			return fmt.Errorf("%s: fewer than two of the keys %s hold orientations; dextral readings %s lists those that do", path, strings.Join(g.keys, ", "), path)
		}
		return fmt.Errorf("%s: no two values there state one orientation; name two with --key, out of those that dextral readings %s lists", path, path)
	}
	var worst error
	for _, group := range groups {
		if err := compare(s, group); err != nil {
			if _, ok := err.(status); !ok {
				return err
			}
			if worst == nil || err.(status) < worst.(status) {
				worst = err
			}
		}
	}
	return worst
}

// groupsOf are the values of the given keys, or those that state one orientation.
func groupsOf(values []*rules.Value, keys []string) [][]*rules.Value {
	byOf := map[string][]*rules.Value{}
	var order []string
	for _, v := range values {
		of := v.Of
		if len(keys) > 0 {
			of = ""
			if slices.Contains(keys, v.Key) {
				of = "keys"
			}
		}
		if of == "" || !v.Decided() {
			continue
		}
		if byOf[of] == nil {
			order = append(order, of)
		}
		byOf[of] = append(byOf[of], v)
	}
	var groups [][]*rules.Value
	for _, of := range order {
		if len(byOf[of]) > 1 {
			groups = append(groups, byOf[of])
		}
	}
	return groups
}

// compare prints the comparison of each value with the first.
func compare(s streams, values []*rules.Value) error {
	code := exitClean
	for _, v := range values[1:] {
		r := rules.Compare(values[0], v)
		if err := report.Identified(s.out, values[0], v, r); err != nil {
			return err
		}
		switch {
		case r.Verdict == identify.Undecided && code == exitClean:
			code = exitUndecided
		case r.Verdict != identify.Undecided && r.Verdict != identify.Agree:
			code = exitFindings
		}
	}
	if code == exitClean {
		return nil
	}
	return status(code)
}
