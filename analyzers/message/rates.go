package message

import (
	"fmt"
	"math"
	"strconv"

	"dextral/core/rotor"
	"dextral/core/tolerance"
	"dextral/rules"
)

// rates are the angular rates that a parameter message states: by the derivative of
// its quaternion, and by ANGVEL blocks. All hold at one epoch.
type rates struct {
	values map[string]number // of the block being read
	frames map[string]string
	turned []quaternionRate
	stated []statedRate
}

type number struct {
	value, half float64
	n           line
}

type quaternionRate struct {
	q, dot rotor.Rotor
	half   float64 // of the derivative's numbers
	a, b   string
	place  line
}

type statedRate struct {
	rate     rotor.Vec // deg/s
	half     float64
	a, b, in string
	place    line
}

func (r *rates) keyword(c *checker, n line) {
	if c.block == "" {
		return
	}
	if r.values == nil {
		r.values, r.frames = map[string]number{}, map[string]string{}
	}
	r.frames[n.key] = n.value
	if x, err := strconv.ParseFloat(n.value, 64); err == nil {
		read, _ := tolerance.Read(n.value)
		r.values[n.key] = number{x, read.Half, n}
	}
}

// boundary takes what the block that ends here said.
func (r *rates) boundary(c *checker) {
	if c.block == "" && r.values != nil {
		if q, ok := r.four("Q1", "Q2", "Q3", "QC"); ok {
			if dot, ok := r.four("Q1_DOT", "Q2_DOT", "Q3_DOT", "QC_DOT"); ok {
				r.turned = append(r.turned, quaternionRate{q, dot, r.half("Q1_DOT", "Q2_DOT", "Q3_DOT", "QC_DOT"), r.frames["REF_FRAME_A"], r.frames["REF_FRAME_B"], r.values["Q1_DOT"].n})
			}
		}
		x, okX := r.values["ANGVEL_X"]
		y, okY := r.values["ANGVEL_Y"]
		z, okZ := r.values["ANGVEL_Z"]
		if okX && okY && okZ && x.n.unit != "rad/s" {
			r.stated = append(r.stated, statedRate{rotor.Vec{X: x.value, Y: y.value, Z: z.value}, r.half("ANGVEL_X", "ANGVEL_Y", "ANGVEL_Z"),
				r.frames["REF_FRAME_A"], r.frames["REF_FRAME_B"], r.frames["ANGVEL_FRAME"], x.n})
		}
	}
	r.values, r.frames = nil, nil
}

func (r *rates) four(x, y, z, w string) (rotor.Rotor, bool) {
	for _, k := range []string{x, y, z, w} {
		if _, ok := r.values[k]; !ok {
			return rotor.Rotor{}, false
		}
	}
	return rotor.FromQuaternion(r.values[w].value, r.values[x].value, r.values[y].value, r.values[z].value), true
}

func (r *rates) half(keys ...string) float64 {
	worst := 0.0
	for _, k := range keys {
		worst = math.Max(worst, r.values[k].half)
	}
	return worst
}

// judge compares every stated rate with that of every quaternion between the same
// frames: q' = q w/2 with w in axes of B, w q/2 in axes of A.
func (r *rates) judge(l *lines) []*rules.Finding {
	const deg = 180 / math.Pi
	var found []*rules.Finding
	for _, q := range r.turned {
		unit, ok := q.q.Unit()
		ok = ok && math.Abs(q.q.Norm()-1) < 1e-3 // else the quaternion is the matter
		for _, s := range r.stated {
			if !ok || q.a != s.a || q.b != s.b || s.in != q.a && s.in != q.b {
				continue
			}
			w := unit.Reverse().Mul(q.dot).Scale(2) // pure: the rate in axes of B
			_, x, y, z := w.Quaternion()
			want := rotor.Vec{X: x, Y: y, Z: z}.Scale(deg)
			if s.in == q.a {
				want = unit.Rotate(want)
			}
			miss := want.Sub(s.rate).Norm()
			open := 2*2*q.half*deg + math.Sqrt(3)*s.half + 8*0x1p-24*want.Norm()
			if miss <= 4*open {
				continue
			}
			f := &rules.Finding{Rule: rules.RatesDiffer, Level: rules.Error, Place: l.place(s.place), Key: "ANGVEL_START",
				Message: fmt.Sprintf("the angular velocity in %s and the derivative of the quaternion state one rate, and differ by %.3g deg/s", s.in, miss),
				Claim:   "one rate with Q1_DOT", Related: []rules.Related{{Place: l.place(q.place), Message: "the derivative of the quaternion"}}}
			for i, name := range []string{"ANGVEL_X", "ANGVEL_Y", "ANGVEL_Z"} {
				a, b := [3]float64{s.rate.X, s.rate.Y, s.rate.Z}[i], [3]float64{want.X, want.Y, want.Z}[i]
				row := rules.Evidence{What: name, Stated: rules.Quantity{Value: a, Unit: "deg/s", Known: true}, Computed: rules.Quantity{Value: b, Unit: "deg/s", Known: true},
					Residual: rules.Quantity{Value: a - b, Unit: "deg/s", Known: true}}
				f.Evidence = append(f.Evidence, row)
				if math.Abs(a*deg-b) <= 4*open && math.Abs(a-b) > 4*open {
					f.Message += "; " + name + " agrees if it is taken in rad/s"
					f.Remedy = "write " + name + " in deg/s, as the standard has it"
				}
			}
			found = append(found, f)
		}
	}
	return found
}
