package series

import (
	"context"
	"fmt"
	"io"
	"strconv"
	"strings"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/ulog"
	"dextral/core/convention"
	"dextral/rules"
)

const ulogFormat = "ULog"

// maxTables bounds the topics of one log that are folded, and so the memory.
const maxTables = 64

// readULog reads the topics of a ULog that hold orientations, each a table of its
// own with rows and stamps of its own.
func readULog(ctx context.Context, path string, in io.Reader, opts Options) (Result, error) {
	r := Result{Format: ulogFormat}
	var tables []*collector
	left := 0
	report, err := ulog.Read(stopping{ctx, in}, func(t *ulog.Topic) func([]byte) {
		c, push := topic(path, t, opts)
		switch {
		case c == nil:
			return nil
		case len(tables) == maxTables:
			left++
			return nil
		}
		tables = append(tables, c)
		return push
	})
	for _, c := range tables {
		c.finish(&r)
	}
	r.BadRows = report.Damaged
	for _, d := range report.First {
		r.FirstBad = append(r.FirstBad, BadRow{rules.Place{Path: path}, fmt.Sprintf("at byte %d: %s", d.Offset, d.Reason)})
	}
	if err == nil && left > 0 {
		err = fmt.Errorf("has more than %d topics with orientations; %d are left out", maxTables, left)
	}
	return r, err
}

// topic makes a table of a topic; nil if it holds no orientations.
func topic(path string, t *ulog.Topic, opts Options) (*collector, func([]byte)) {
	if strings.HasPrefix(t.Name, "manual_control") { // positions of sticks, called x, y, z, r or roll, pitch, yaw
		return nil, nil
	}
	name := t.Name
	if t.Nth > 0 {
		name += "." + strconv.Itoa(t.Nth)
	}
	var all []columns.Column
	var single []bool
	var fields []*ulog.Field
	if t.Stamped() { // the first of them, so that it is found before others such as timestamp_sample
		all = append(all, columns.Column{Text: "timestamp", Unit: "us", Place: rules.Place{Path: path}})
		single, fields = append(single, false), append(fields, nil)
	}
	for i := range t.Fields {
		f := &t.Fields[i]
		if strings.HasPrefix(f.Name, "timestamp") || f.Flag() {
			continue
		}
		all = append(all, columns.Column{Text: name + "." + f.Name, Place: rules.Place{Path: path}})
		single, fields = append(single, f.Single()), append(fields, f)
	}
	inner := opts
	inner.Declare = func(v *rules.Value) {
		v.Claims = append(v.Claims, published(t, name, v)...)
		if opts.Declare != nil {
			opts.Declare(v)
		}
	}
	c, which := newCollector(path, ulogFormat, all, single, inner)
	if c == nil {
		return nil, nil
	}
	row := make([]fold.Cell, len(which))
	return c, func(data []byte) {
		for k, i := range which {
			if fields[i] == nil {
				row[k], _ = t.Stamp(data)
			} else {
				row[k] = fields[i].Cell(data)
			}
		}
		c.push(row)
	}
}

// bodyToEarth are the topics whose quaternion q turns coordinates of the body, x
// forward, y right, z down, into those of the earth, x north, y east, z down.
var bodyToEarth = map[string]bool{"vehicle_attitude": true, "vehicle_attitude_groundtruth": true, "external_ins_attitude": true, "estimator_attitude": true}

// scalarFirst are topics with a quaternion in the order w, x, y, z, by the name of
// its field.
var scalarFirst = map[string]string{"vehicle_attitude_setpoint": "q_d", "vehicle_odometry": "q", "vehicle_visual_odometry": "q", "vehicle_mocap_odometry": "q", "estimator_odometry": "q"}

// published are the claims that PX4's message reference makes on a quaternion:
// Hamilton's, in the order w, x, y, z; that of the attitude is the "rotation from
// the FRD body frame to the NED earth frame" (VehicleAttitude, docs.px4.io), v_NED
// = R v_FRD. They hold for logs of PX4.
func published(t *ulog.Topic, name string, v *rules.Value) rules.Claims {
	if t.System != "PX4" || v.Form != convention.Quaternion {
		return nil
	}
	attitude := bodyToEarth[t.Name] && v.Key == name+".q"
	if !attitude && (scalarFirst[t.Name] == "" || v.Key != name+"."+scalarFirst[t.Name]) {
		return nil
	}
	says := []convention.Term{convention.Quaternion, convention.ScalarFirst, convention.Hamilton}
	if attitude {
		says = append(says, convention.Direction{To: "NED", From: "FRD"})
	}
	var claims rules.Claims
	for _, term := range says {
		claims = append(claims, rules.Claim{Says: term, Source: rules.Format, Text: "PX4 message " + t.Name, Place: v.Place})
	}
	return claims
}

// stopping is a reader that fails when its context is cancelled.
type stopping struct {
	ctx context.Context
	in  io.Reader
}

func (s stopping) Read(p []byte) (int, error) {
	if err := s.ctx.Err(); err != nil {
		return 0, err
	}
	return s.in.Read(p)
}
