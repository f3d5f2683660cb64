package measure

import "strings"

// Key is the function's place in its package, as findings and waivers call it: "Mul",
// "Quat.Mul".
func (f *Function) Key() string {
	name := f.Object.Name()
	sig := f.Object.Signature()
	if sig.Recv() == nil {
		return name
	}
	recv := typeName(pointee(sig.Recv().Type()))
	recv = recv[strings.LastIndexByte(recv, '/')+1:]
	recv, _, _ = strings.Cut(recv, "[")
	return recv[strings.IndexByte(recv, '.')+1:] + "." + name
}

// Label is how messages call a function in one of its settings.
func (f *Function) Label(c *Case) string {
	if c.Label == "" {
		return f.Key()
	}
	return f.Key() + " with " + c.Label
}
