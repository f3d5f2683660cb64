package identify

import (
	"math"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"
)

// maxCost bounds the set of hypotheses: readings are searched up to this sum of costs.
const maxCost = 6

// reading is one way to take the numbers and the rotation that follows.
type reading struct {
	rotor  rotor.Rotor
	tol    float64
	spread float64 // see mappable
	set    changeSet
	cost   int8
	code
}

// code is a Reading in few bytes: there may be a thousand of them.
type code struct {
	scalar     convention.ScalarPlace
	unit       convention.Unit
	parameters Parameters
	mirrored   bool
	way, name  uint8 // of turnNames
	signs      uint8 // bit i: number i negated
}

// reading spells a code out.
func (d *side) reading(c code) Reading {
	r := Reading{Form: d.form, Scalar: c.scalar, Unit: c.unit, Parameters: c.parameters, Mirrored: c.mirrored}
	if d.form == convention.Angles {
		r.Turns = turnNames[c.way][c.name]
		r.Turns.Negated = negations[c.signs]
	}
	return r
}

// negations spells out the bits of signs.
var negations = func() (n [8][3]bool) {
	for signs := range n {
		for i := range 3 {
			n[signs][i] = signs>>i&1 != 0
		}
	}
	return n
}()

// side is one statement with its readings in order of cost. Readings of angles
// are many, and made only when the search reaches their cost.
type side struct {
	form     convention.Form
	readings []reading
	upto     [maxCost + 2]int // readings[upto[c]:upto[c+1]] cost c
	ready    int              // costs below this have been made
	reversed bool             // the claims make the rotation the reverse of what the numbers say
	mirrored bool
	powers   bool // a half or double turn is among the changes
	free     bool // a bare label leaves the direction open

	units  [2]unitReading
	halves [2][3]halfTurn
	turns  *[72]named
	angles [3]float64
}

// unitReading is one way to take a unit.
type unitReading struct {
	unit convention.Unit
	tol  float64
	cost int8
}

// read starts d afresh on a statement, using its memory again. It says why
// not where the statement cannot be read.
func (d *side) read(s Statement) string {
	if why := s.unreadable(); why != "" {
		return why
	}
	*d = side{form: s.Form, units: unitReadings(s), readings: d.readings[:0]}
	d.powers = s.Form == convention.Quaternion || s.Form == convention.RotationVector || s.Form == convention.AxisAngle
	why := ""
	switch s.Form {
	case convention.Quaternion:
		why = d.quaternion(s)
	case convention.Rotation:
		why = d.matrix(s)
	case convention.RotationVector:
		why = d.vector(s)
	case convention.AxisAngle:
		why = d.axisAngle(s)
	case convention.Angles:
		d.angle(s)
		return ""
	}
	d.sort()
	return why
}

// unitReadings gives the claimed unit, or both, and what they do to the
// tolerance, which scales with the unit but not below what float32 leaves open.
func unitReadings(s Statement) [2]unitReading {
	floor := math.Min(s.Tolerance, tolerance.Precision{}.Angles(convention.Radian))
	first, second := convention.Radian, convention.Degree
	if s.Claim.Unit == convention.Degree {
		first, second = second, first
	}
	cost := int8(UnitSlip.Cost())
	if s.Claim.Unit == convention.UnitUnstated {
		cost = 0
	}
	scaled := math.Min(math.Pi, math.Max(floor, s.Tolerance*second.InRadians()/first.InRadians()))
	return [2]unitReading{{first, s.Tolerance, 0}, {second, scaled, cost}}
}

func (u unitReading) set() changeSet {
	if u.cost > 0 {
		return set(UnitSlip)
	}
	return 0
}

func (d *side) add(r rotor.Rotor, tol float64, s changeSet, cost int8, how code) {
	if unit, ok := r.Unit(); ok {
		d.readings = append(d.readings, reading{unit, math.Min(tol, math.Pi), spread(unit), s, cost, how})
	}
}

// reverse makes the rotation the reverse of what the numbers say.
func (d *side) reverse() {
	d.reversed = !d.reversed
	for i := range d.readings {
		d.readings[i].rotor = d.readings[i].rotor.Reverse()
	}
}

func (d *side) quaternion(s Statement) string {
	n := s.Numbers
	for place := convention.ScalarFirst; place <= convention.ScalarLast; place++ {
		var changes changeSet
		var cost int8
		if s.Claim.Scalar != convention.ScalarUnstated && s.Claim.Scalar != place {
			changes, cost = set(ScalarOrder), int8(ScalarOrder.Cost())
			if s.Claim.Named {
				cost++
			}
		}
		r := rotor.FromQuaternion(n[0], n[1], n[2], n[3])
		if place == convention.ScalarLast {
			r = rotor.FromQuaternion(n[3], n[0], n[1], n[2])
		}
		d.add(r, s.Tolerance, changes, cost, code{scalar: place})
	}
	if len(d.readings) == 0 {
		return "all its numbers are zero"
	}
	return ""
}

func (d *side) matrix(s Statement) string {
	order := s.Claim.Storage
	if order == convention.StorageUnstated {
		order = convention.RowMajor
	}
	m, _ := matrix.FromFlat(s.Numbers, order)
	how := code{}
	var changes changeSet
	if m.Det() < 0 {
		m, how.mirrored, d.mirrored = m.Scale(-1), true, true
		changes = set(Mirror)
	}
	rotation, distance, ok := matrix.Nearest(m)
	if !ok || distance > maxShear {
		return "its nine numbers are far from a rotation"
	}
	d.add(rotation.Rotor(), s.Tolerance, changes, int8(len(changes.list())*Mirror.Cost()), how)
	return ""
}

// maxShear is how far, in the Frobenius norm, nine numbers may be from a
// rotation that is compared: beyond 0.2 two of their columns may miss the right
// angle by more than ten degrees, and the nearest rotation is no longer what
// anybody meant.
const maxShear = 0.2

// unmirror forgives a mirror.
func (d *side) unmirror() {
	d.readings[0].cost, d.readings[0].set = 0, 0
	d.sort()
}

func (d *side) vector(s Statement) string {
	v := rotor.Vec{X: s.Numbers[0], Y: s.Numbers[1], Z: s.Numbers[2]}
	for _, u := range d.units {
		d.add(rotor.FromRotationVector(v.Scale(u.unit.InRadians())), u.tol, u.set(), u.cost, code{unit: u.unit})
	}
	cost := int8(Kind.Cost())
	d.add(rotor.FromGibbs(v), 2*s.Tolerance, set(Kind), cost, code{parameters: Gibbs})
	d.add(rotor.FromMRP(v), 4*s.Tolerance, set(Kind), cost, code{parameters: MRP})
	if n := v.Dot(v); n < 1 {
		r := rotor.FromQuaternion(math.Sqrt(1-n), v.X, v.Y, v.Z)
		d.add(r, 2*s.Tolerance/r.S, set(Kind), cost, code{parameters: VectorPart})
	}
	return ""
}

func (d *side) axisAngle(s Statement) string {
	n := s.Numbers
	axis := rotor.Vec{X: n[0], Y: n[1], Z: n[2]}
	for _, u := range d.units {
		if r, ok := rotor.FromAxisAngle(axis, n[3]*u.unit.InRadians()); ok {
			d.add(r, u.tol, u.set(), u.cost, code{unit: u.unit})
		}
	}
	if len(d.readings) == 0 {
		return "its axis is zero"
	}
	return ""
}

func (d *side) angle(s Statement) {
	d.angles = [3]float64(s.Numbers)
	for i, u := range d.units {
		d.halves[i] = halfTurns(s.Numbers, u.unit.InRadians())
	}
	if s.Claim.Label == nil {
		d.turns, d.free = &unlabelled, true
		return
	}
	allowed := make([]angle.Reading, 0, len(s.Claim.Label.Readings))
	for _, r := range s.Claim.Label.Readings {
		d.free = d.free || r.Inverse
		if r.Valid() {
			allowed = append(allowed, r)
		}
	}
	if len(allowed) == 0 {
		d.turns, d.free = &unlabelled, true
		return
	}
	table := nameAll(allowed)
	d.turns = &table
}

// unlabelled prices turns about which nothing is said: the numbers are written
// in the order of the turns, or in that of the axes x, y, z.
var unlabelled = func() [72]named {
	var all []angle.Reading
	for _, s := range angle.Sequences() {
		all = append(all, angle.Reading{Seq: s, Order: [3]int{0, 1, 2}})
		if !s.Proper() {
			all = append(all, angle.Reading{Seq: s, Order: [3]int{int(s.Axes[0]), int(s.Axes[1]), int(s.Axes[2])}})
		}
	}
	return nameAll(all)
}()

// sort orders the readings by cost, which are few, and fills in upto.
func (d *side) sort() {
	for i := 1; i < len(d.readings); i++ {
		for j := i; j > 0 && d.readings[j].cost < d.readings[j-1].cost; j-- {
			d.readings[j], d.readings[j-1] = d.readings[j-1], d.readings[j]
		}
	}
	at := 0
	for c := range d.upto {
		for at < len(d.readings) && int(d.readings[at].cost) < c {
			at++
		}
		d.upto[c] = at
	}
	d.ready = maxCost + 1
}

// at gives the readings that cost c.
func (d *side) at(c int) []reading {
	for d.ready <= c {
		d.upto[d.ready] = len(d.readings)
		d.makeTurns(int8(d.ready))
		d.ready++
		d.upto[d.ready] = len(d.readings)
	}
	return d.readings[d.upto[c]:d.upto[c+1]]
}

// makeTurns adds the readings of angles that cost c.
func (d *side) makeTurns(c int8) {
	for u, unit := range d.units {
		for i := range d.turns {
			n := &d.turns[i]
			rest := c - unit.cost - n.cost
			switch {
			case rest == 0:
				d.addTurns(u, i, 0, c)
			case rest == int8(AngleSign.Cost()):
				for signs := 1; signs < 8; signs++ {
					d.addTurns(u, i, signs, c)
				}
			}
		}
	}
}

func (d *side) addTurns(u, way, signs int, cost int8) {
	n := &d.turns[way]
	changes := n.set | d.units[u].set()
	if signs != 0 {
		changes |= set(AngleSign)
	}
	turns := &turnNames[way][0]
	r := turns.rotor(&d.halves[u], &negations[signs])
	if d.reversed {
		r = r.Reverse()
	}
	wide := 0.0
	if cost <= maxWide-int8(Remap.Cost()) { // no map of axes is looked for beyond
		wide = spread(r)
	}
	d.readings = append(d.readings, reading{
		r, d.units[u].tol, wide, changes, cost,
		code{unit: d.units[u].unit, way: uint8(way), name: n.name, signs: uint8(signs)},
	})
}
