package literal

import "dextral/rules"

func (w *walker) terms(s site, value *rules.Value) {}
