package report

import (
	"math"

	"dextral/rules"
)

// changeRow is a change in machine formats.
type changeRow struct {
	Effect  string    `json:"effect"`
	Text    string    `json:"text"`
	Degrees float64   `json:"degrees,omitempty"` // in the reading where it is largest
	Shift   float64   `json:"shift,omitempty"`   // of the translation, in its unit
	Before  *valueRow `json:"before,omitempty"`
	After   *valueRow `json:"after,omitempty"`
}

// valueRow is one side of a change.
type valueRow struct {
	Place   rules.Place `json:"place"`
	Key     string      `json:"key"`
	Reading string      `json:"reading"`
	Numbers []string    `json:"numbers"` // as written
}

func changeRows(list []rules.Change) []changeRow {
	rows := make([]changeRow, 0, len(list))
	for _, c := range list {
		rows = append(rows, changeRow{c.Effect.String(), c.Text, c.Angle * 180 / math.Pi, c.Shift, newValueRow(c.Before), newValueRow(c.After)})
	}
	return rows
}

func newValueRow(v *rules.Value) *valueRow {
	if v == nil {
		return nil
	}
	row := &valueRow{Place: v.Place, Key: v.Key, Reading: v.Reading(), Numbers: []string{}}
	for _, n := range v.Numbers {
		row.Numbers = append(row.Numbers, n.Text)
	}
	return row
}
