package series

import (
	"bytes"
	"cmp"
	"path"
	"slices"
	"strings"

	"dextral/analyzers/series/text"
	"dextral/analyzers/series/ulog"
)

// Kind says what sort of log a file is, if it is one. The zero Kind is none.
type Kind struct {
	Name     string // such as "delimited text" or "ROS bag"; "" for what is no log
	Readable bool   // Read reads it
}

// None reports whether the file is no log.
func (k Kind) None() bool { return k.Name == "" }

// HeadSize is how much of the start of a file Recognise wants to see. It makes do with less.
const HeadSize = text.MaxHead

// magics are the first bytes of formats that hold attitude logs, or may, and are
// not read.
var magics = []struct{ magic, name string }{
	{"#ROSBAG V", "ROS bag"},
	{"\x89MCAP0\r\n", "MCAP"},
	{"\x89HDF\r\n\x1a\n", "HDF5"},
	{"MATLAB 7.3 MAT-file", "MAT-file"},
	{"MATLAB 5.0 MAT-file", "MAT-file"},
	{parquetMagic, parquetName}, // inside of a packing, where it cannot be read from its end
	{"ARROW1", "Arrow"},
	{"FEA1", "Feather"},
	{"Obj\x01", "Avro"},
	{"\x93NUMPY", "NumPy array"},
	{"SQLite format 3\x00", "SQLite database"},
	{"CDF\x01", "NetCDF"}, {"CDF\x02", "NetCDF"}, {"CDF\x05", "NetCDF"},
	{"\xcd\xf3\x00\x01", "CDF"},
	{"DAF/CK", "SPICE C-kernel"},
	{"\xa3\x95\x80\x80", "ArduPilot dataflash log"},
	{"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1", "spreadsheet (xls)"},
	{"BZh", "bzip2"},
	{"\xfd7zXZ\x00", "xz"},
	{"\x04\x22\x4d\x18", "LZ4"},
	{"\x28\xb5\x2f\xfd", "zstd"},
	{"\x1f\x8b", "gzip"},
	{"7z\xbc\xaf\x27\x1c", "7z archive"},
	{"PK\x03\x04", "zip archive"},
	{"CCSDS_AEM_VERS", "CCSDS attitude ephemeris (KVN)"},
}

// extensions name formats whose files begin with nothing telling.
var extensions = map[string]string{
	".bag": "ROS bag", ".mcap": "MCAP", ".db3": "SQLite database", ".ulg": "ULog", ".px4log": "PX4 log", ".tlog": "MAVLink telemetry log",
	".mat": "MAT-file", ".h5": "HDF5", ".hdf5": "HDF5", ".hdf": "HDF5", ".parquet": "Parquet", ".feather": "Feather", ".arrow": "Arrow",
	".npy": "NumPy array", ".xls": "spreadsheet (xls)",
	".tdms": "TDMS", ".mf4": "MDF", ".mdf": "MDF", ".sbf": "GNSS log", ".ubx": "GNSS log", ".pcap": "packet capture", ".pcapng": "packet capture",
}

// tables are the extensions of text files that can be a log. Other text, such
// as program code, point clouds and prose with a table in it, is none.
var tables = []string{"", ".csv", ".tsv", ".tab", ".txt", ".dat", ".data", ".log", ".asc", ".out", ".prn", ".tum", ".kitti", ".traj", ".trj", ".pose", ".poses",
	".gt", ".odom", ".imu", ".att", ".mocap", ".freiburg"}

// jsonLines are the extensions of files that can be JSON lines.
var jsonLines = []string{".jsonl", ".ndjson", ".jsonlines", ".json"}

// promised are the extensions that promise a table.
var promised = []string{".csv", ".tsv", ".jsonl", ".ndjson", ".jsonlines"}

// Recognise says what kind of log a file is by its name and its first bytes.
func Recognise(name string, head []byte) Kind {
	p, packed := packingOf(head)
	switch {
	case bytes.HasPrefix(head, []byte(parquetMagic)):
		return Kind{parquetName, true}
	case !packed:
		return recognise(name, head)
	}
	if extension := strings.ToLower(path.Ext(name)); extension == ".gz" || extension == ".zst" {
		name = strings.TrimSuffix(name, path.Ext(name))
	}
	inner := recognise(name, p.unpacked(head))
	if inner.Name == "" {
		return Kind{}
	}
	return Kind{inner.Name + ", " + p.name, inner.Readable}
}

func recognise(name string, head []byte) Kind {
	extension := strings.ToLower(path.Ext(name))
	if bytes.HasPrefix(head, []byte(ulog.Magic)) {
		return Kind{ulogFormat, true}
	}
	for _, m := range magics {
		if bytes.HasPrefix(head, []byte(m.magic)) {
			return Kind{Name: cmp.Or(packed[m.name][extension], m.name)}
		}
	}
	switch {
	case len(head) > 262 && string(head[257:262]) == "ustar":
		return Kind{Name: "tar archive"}
	case slices.Contains(tables, extension) && (bytes.HasPrefix(head, []byte("\xff\xfe")) || bytes.HasPrefix(head, []byte("\xfe\xff"))):
		return Kind{Name: "UTF-16 text"}
	case binary(head):
		return Kind{Name: extensions[extension]}
	case slices.Contains(tables, extension), slices.Contains(jsonLines, extension):
		return tableKind(name, extension, head)
	}
	return Kind{}
}

// tableKind looks into a text file. A table without orientations is a log only if
// its name says that it is a table.
func tableKind(name, extension string, head []byte) Kind {
	t, ok := sniff(name, head, len(head) < HeadSize)
	switch {
	case !ok && slices.Contains(promised, extension) && bytes.Count(head, []byte{'\n'}) < 2 && len(head) >= 4096:
		return Kind{"delimited text", true} // a long header, of which Read sees more
	case !ok:
		return Kind{}
	}
	isJSON := t.format == jsonFormat
	switch {
	case extension == ".json" && len(t.head.rows) < 2:
		return Kind{} // one object: a document
	case slices.Contains(jsonLines, extension) && !isJSON:
		return Kind{} // the numbers of some other JSON, line by line
	}
	if !slices.Contains(promised, extension) && !plan(&t.head, Options{}).any() {
		return Kind{}
	}
	if isJSON {
		return Kind{jsonFormat, true}
	}
	return Kind{"delimited text", true}
}

// packed are the formats that are an archive of their own extension.
var packed = map[string]map[string]string{"zip archive": {
	".npz": "NumPy archive", ".xlsx": "spreadsheet (xlsx)", ".ods": "spreadsheet (ods)",
}}

// binary reports whether bytes are no text: they contain NUL, or more than one in
// twenty is a control character.
func binary(head []byte) bool {
	controls := 0
	for _, b := range head {
		switch {
		case b == 0:
			return true
		case b < ' ' && b != '\n' && b != '\r' && b != '\t' && b != '\f':
			controls++
		}
	}
	return controls*20 > len(head)
}
