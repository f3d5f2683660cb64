package tape

import "testing"

func TestSmoke(t *testing.T) {
	p := &Program{Name: "add", Slots: 3, Code: []Instr{{Op: AddF, Dst: 2, A: 0, B: 1}, {Op: Return}}, Blocks: []int32{0},
		Returns: [][]Range{{{2, 1}}}}
	p.Sig.Params = []Param{{Name: "a", Words: 1, Fields: []Field{{"", F64}}}, {Name: "b", Words: 1, Fields: []Field{{"", F64}}}}
	p.Sig.Results = []Result{{Words: 1, Fields: []Field{{"", F64}}}}
	m, err := Link(p, nil)
	if err != nil {
		t.Fatal(err)
	}
	b := m.NewBatch(2)
	b.Set(1, 0, 3)
	b.Set(1, 1, 4)
	m.Run(b)
	if b.Out(1, 0) != 7 || b.Out(0, 0) != 0 {
		t.Fatal(b.Out(1, 0))
	}
	t.Log(p)
}
