package message

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"dextral/analyzers/series"
	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The numbers are those of one motion at a constant rate, from ICRF to SC_BODY_1:
// ZYX 30, 20, 10 degrees at the start, body rate 0.3, -0.2, 0.5 deg/s, computed outside
// of this project with SciPy.
const ephemeris = `CCSDS_AEM_VERS = 2.0
CREATION_DATE = 2031-03-04T13:00:00
ORIGINATOR = SALTMARSH

META_START
OBJECT_NAME = TERN
OBJECT_ID = 2031-001A
REF_FRAME_A = ICRF
REF_FRAME_B = SC_BODY_1
TIME_SYSTEM = UTC
START_TIME = 2031-03-04T12:00:00.000
STOP_TIME = 2031-03-04T12:01:00.000
ATTITUDE_TYPE = QUATERNION
INTERPOLATION_METHOD = LINEAR
INTERPOLATION_DEGREE = 1
META_STOP

DATA_START
2031-03-04T12:00:00.000 0.038134576475 0.189307857412 0.239298337745 0.951548524644
2031-03-04T12:00:10.000 0.075409540342 0.177033024173 0.274832356220 0.942040278094
2031-03-04T12:00:20.000 0.112466331765 0.164246004710 0.309571238604 0.929806551055
2031-03-04T12:00:35.000 0.167408169364 0.144186431822 0.359969527162 0.906425240835
2031-03-04T12:01:00.000 0.256383504760 0.108735916843 0.438605858980 0.854440693871
DATA_STOP

META_START
OBJECT_NAME = TERN
OBJECT_ID = 2031-001A
REF_FRAME_A = ICRF
REF_FRAME_B = SC_BODY_1
TIME_SYSTEM = UTC
START_TIME = 2031-03-04T12:00:00.000
STOP_TIME = 2031-03-04T12:01:00.000
ATTITUDE_TYPE = EULER_ANGLE
EULER_ROT_SEQ = ZYX
META_STOP

DATA_START
2031-03-04T12:00:00.000 30.000000000000 20.000000000000 10.000000000000
2031-03-04T12:00:10.000 34.703885888918 16.983393287338 14.495399858929
DATA_STOP
`

func judge(t *testing.T, text string) string {
	t.Helper()
	e, err := ReadEphemeris(context.Background(), "tern.kvn", strings.NewReader(text), series.Options{})
	require.NoError(t, err)
	found := append(e.Findings, rules.CheckValues(e.Values)...)
	for _, s := range e.Series {
		found = append(found, rules.CheckSeries(s)...)
		found = append(found, rules.CheckClock(s)...)
	}
	var lines []string
	for _, f := range found {
		lines = append(lines, f.Place.String()+" "+f.Rule)
	}
	return strings.Join(lines, "; ")
}

// Every fault is reported, at its line, by the rule of its kind.
func TestFaultyEphemerides(t *testing.T) {
	const line1 = "2031-03-04T12:00:00.000 0.038134576475 0.189307857412 0.239298337745 0.951548524644\n"
	const line2 = "2031-03-04T12:00:10.000 0.075409540342 0.177033024173 0.274832356220 0.942040278094\n"
	assert.Empty(t, judge(t, ephemeris))
	assert.Empty(t, judge(t, strings.ReplaceAll(ephemeris, "\n", "\r\n")))
	for name, c := range map[string]struct{ old, now, want string }{
		"direction":       {"ATTITUDE_TYPE = QUATERNION\n", "ATTITUDE_DIR = A2B\nATTITUDE_TYPE = QUATERNION\n", "tern.kvn:13:16 message-malformed"},
		"scalar place":    {"ATTITUDE_TYPE = QUATERNION\n", "ATTITUDE_TYPE = QUATERNION\nQUATERNION_TYPE = FIRST\n", "tern.kvn:14:19 message-malformed"},
		"digits":          {"= ZYX", "= 321", "tern.kvn:35:17 message-malformed"},
		"method":          {"INTERPOLATION_DEGREE = 1\n", "", "tern.kvn:15:1 message-malformed"},
		"comment":         {line2, "COMMENT here\n" + line2, "tern.kvn:20:1 message-malformed"},
		"missing number":  {" 0.951548524644\n", "\n", "tern.kvn:19:1 message-malformed"},
		"unit":            {" 0.951548524644\n", " 0.951548524644 [1]\n", "tern.kvn:19:1 message-malformed"},
		"span":            {"STOP_TIME = 2031-03-04T12:01:00.000\nATTITUDE_TYPE = Q", "STOP_TIME = 2031-03-04T12:00:50.000\nATTITUDE_TYPE = Q", "tern.kvn:23:1 message-malformed"},
		"backwards":       {line1 + line2, line2 + line1, "tern.kvn:20:1 message-malformed"},
		"repeated":        {line2, strings.Replace(line2, "00:10.000", "00:00.000", 1), "tern.kvn:20:1 stamps-not-increasing"},
		"sign":            {"0.112466331765 0.164246004710 0.309571238604 0.929806551055", "-0.112466331765 -0.164246004710 -0.309571238604 -0.929806551055", "tern.kvn:21:1 sign-jump"},
		"conjugate":       {"0.038134576475 0.189307857412 0.239298337745", "-0.038134576475 -0.189307857412 -0.239298337745", "direction-reversed"},
		"scalar moved":    {"0.038134576475 0.189307857412 0.239298337745 0.951548524644", "0.951548524644 0.038134576475 0.189307857412 0.239298337745", "representations-differ"}, // 30, 20, 10 degrees are too special for a cause
		"not unit":        {"0.112466331765 0.164246004710 0.309571238604", "0.412466331765 0.164246004710 0.309571238604", "norm-loss"},
		"sequence":        {"= ZYX", "= XYZ", "sequence-mislabelled"},
		"another object":  {"OBJECT_ID = 2031-001A\nREF_FRAME_A = ICRF\nREF_FRAME_B = SC_BODY_1\nTIME_SYSTEM = UTC\nSTART_TIME = 2031-03-04T12:00:00.000\nSTOP_TIME = 2031-03-04T12:01:00.000\nATTITUDE_TYPE = EULER_ANGLE\nEULER_ROT_SEQ = ZYX", "OBJECT_ID = 2031-001B\nREF_FRAME_A = ICRF\nREF_FRAME_B = SC_BODY_1\nTIME_SYSTEM = UTC\nSTART_TIME = 2031-03-04T12:00:00.000\nSTOP_TIME = 2031-03-04T12:01:00.000\nATTITUDE_TYPE = EULER_ANGLE\nEULER_ROT_SEQ = XYZ", ""},
		"first issue":     {"CCSDS_AEM_VERS = 2.0", "CCSDS_AEM_VERS = 1.0", ""},
		"other direction": {"REF_FRAME_A = ICRF\nREF_FRAME_B = SC_BODY_1\nTIME_SYSTEM = UTC\nSTART_TIME = 2031-03-04T12:00:00.000\nSTOP_TIME = 2031-03-04T12:01:00.000\nATTITUDE_TYPE = E", "REF_FRAME_A = SC_BODY_1\nREF_FRAME_B = ICRF\nTIME_SYSTEM = UTC\nSTART_TIME = 2031-03-04T12:00:00.000\nSTOP_TIME = 2031-03-04T12:01:00.000\nATTITUDE_TYPE = E", ""},
	} {
		require.Contains(t, ephemeris, c.old, name)
		got := judge(t, strings.Replace(ephemeris, c.old, c.now, 1))
		if c.want == "" {
			assert.Empty(t, got, name)
		} else {
			assert.Contains(t, got, c.want, name)
		}
	}
}

// Places of rows are lines of the file, in both notations; numbers stand where their
// places say.
func TestPlaces(t *testing.T) {
	e, err := ReadEphemeris(context.Background(), "tern.kvn", strings.NewReader(ephemeris), series.Options{})
	require.NoError(t, err)
	require.Len(t, e.Series, 2)
	assert.Equal(t, 19, e.Series[0].RowPlace(1).Line)
	assert.Equal(t, 23, e.Series[0].RowPlace(5).Line)
	lines := strings.Split(ephemeris, "\n")
	for _, v := range e.Values {
		for _, n := range v.Numbers {
			assert.Equal(t, n.Text, lines[n.Place.Line-1][n.Place.Column-1:n.Place.EndColumn-1])
		}
	}
}

// A comprehensive message in our numbers; keywords by table 5-4, from memory.
const comprehensive = `CCSDS_ACM_VERS = 2.0
CREATION_DATE = 2031-03-04T13:00:00
ORIGINATOR = SALTMARSH
META_START
OBJECT_NAME = TERN
TIME_SYSTEM = UTC
EPOCH_TZERO = 2031-03-04T12:00:00
META_STOP
ATT_START
REF_FRAME_A = ICRF
REF_FRAME_B = SC_BODY_1
NUMBER_STATES = 7
ATT_TYPE = QUATERNION
RATE_TYPE = ANGVEL
0.0 0.038134576475 0.189307857412 0.239298337745 0.951548524644 0.3 -0.2 0.5
10.0 0.075409540342 0.177033024173 0.274832356220 0.942040278094 0.3 -0.2 0.5
20.0 0.112466331765 0.164246004710 0.309571238604 0.929806551055 0.3 -0.2 0.5
ATT_STOP
ATT_START
REF_FRAME_A = ICRF
REF_FRAME_B = SC_BODY_1
NUMBER_STATES = 9
ATT_TYPE = DCM
0.0 0.8137976814 -0.4409696105 0.3785223064 0.4698463104 0.8825641193 0.0180283112 -0.3420201433 0.1631759112 0.9254165784
10.0 0.7862529687 -0.4911063407 0.3749944420 0.5445062565 0.8375611544 -0.0447688424 -0.2920945315 0.2393864550 0.9259454192
ATT_STOP
`

func TestComprehensive(t *testing.T) {
	assert.Empty(t, judge(t, comprehensive))
	assert.Equal(t, "tern.kvn:16:1 sign-jump", judge(t, strings.Replace(comprehensive, "0.075409540342 0.177033024173 0.274832356220 0.942040278094", "-0.075409540342 -0.177033024173 -0.274832356220 -0.942040278094", 1)))
	assert.Contains(t, judge(t, strings.Replace(comprehensive, "0.038134576475 0.189307857412 0.239298337745", "-0.038134576475 -0.189307857412 -0.239298337745", 1)), "direction-reversed")
	e, err := ReadEphemeris(context.Background(), "tern.kvn", strings.NewReader(comprehensive), series.Options{})
	require.NoError(t, err)
	assert.Len(t, e.Series, 2)
	lines := strings.Split(comprehensive, "\n")
	for _, v := range e.Values {
		for _, n := range v.Numbers {
			assert.Equal(t, n.Text, lines[n.Place.Line-1][n.Place.Column-1:n.Place.EndColumn-1])
		}
	}
}

const inXML = `<?xml version="1.0"?>
<aem id="CCSDS_AEM_VERS" version="2.0">
<header><ORIGINATOR>SALTMARSH</ORIGINATOR></header>
<body><segment>
<metadata><REF_FRAME_A>ICRF</REF_FRAME_A><REF_FRAME_B>SC_BODY_1</REF_FRAME_B><ATTITUDE_TYPE>QUATERNION</ATTITUDE_TYPE></metadata>
<data>
<attitudeState><quaternionEphemeris><EPOCH>2031-03-04T12:00:00.000</EPOCH>
<quaternion><Q1>0.038134576475</Q1><Q2>0.189307857412</Q2><Q3>0.239298337745</Q3><QC>0.951548524644</QC></quaternion></quaternionEphemeris></attitudeState>
<attitudeState><quaternionEphemeris><EPOCH>2031-03-04T12:00:10.000</EPOCH>
<quaternion><Q1>-0.075409540342</Q1><Q2>-0.177033024173</Q2><Q3>-0.274832356220</Q3><QC>-0.942040278094</QC></quaternion></quaternionEphemeris></attitudeState>
</data></segment></body></aem>
`

func TestXML(t *testing.T) {
	assert.Equal(t, "tern.kvn:9:1 sign-jump", judge(t, inXML))
	e, err := ReadEphemeris(context.Background(), "tern.xml", strings.NewReader(inXML), series.Options{})
	require.NoError(t, err)
	require.Len(t, e.Values, 1)
	lines := strings.Split(inXML, "\n")
	for _, n := range e.Values[0].Numbers {
		assert.Equal(t, n.Text, lines[n.Place.Line-1][n.Place.Column-1:n.Place.EndColumn-1])
	}
	_, err = ReadEphemeris(context.Background(), "tern.xml", strings.NewReader(inXML[:len(inXML)/2]), series.Options{})
	assert.ErrorContains(t, err, "reading stopped near line")
}

// The check values from outside the project, where they are at hand: good messages are
// silent, and each of the faulty ones is reported.
func TestOutsideMessages(t *testing.T) {
	dir := "../../../shared/checks/ccsds"
	names, _ := filepath.Glob(dir + "/*/aem*.kvn")
	good, _ := filepath.Glob(dir + "/aem*")
	if len(names) == 0 {
		t.Skip("the messages from outside the project are not here")
	}
	for _, name := range append(names, good...) {
		text, err := os.ReadFile(name)
		require.NoError(t, err)
		got := judge(t, string(text))
		assert.Equal(t, strings.Contains(name, "bad"), got != "", "%s: %s", name, got)
	}
}

func FuzzReadEphemeris(f *testing.F) {
	f.Add([]byte(ephemeris))
	f.Add([]byte(inXML))
	f.Add([]byte(comprehensive))
	f.Add([]byte("CCSDS_AEM_VERS = 2.0\nMETA_START\nATTITUDE_TYPE = QUATERNION\nMETA_STOP\nDATA_START\n"))
	f.Fuzz(func(t *testing.T, text []byte) {
		if !IsEphemeris(text) {
			return
		}
		e, err := ReadEphemeris(context.Background(), "a.kvn", strings.NewReader(string(text)), series.Options{})
		if err != nil {
			return
		}
		for _, found := range e.Findings {
			require.NotEmpty(t, found.Message)
			require.Positive(t, found.Place.Line)
		}
		rules.CheckValues(e.Values)
		for _, s := range e.Series {
			rules.CheckSeries(s)
		}
	})
}

func FuzzCheckParameters(f *testing.F) {
	f.Add("CCSDS_APM_VERS = 2.0\nQUAT_START\nREF_FRAME_A = A\nQ1 = 0\nQ1_DOT = 1 [1/s]\nCOMMENT x\nQUAT_STOP\nANGVEL_START\nANGVEL_X = 1 [deg/s]\n")
	f.Add("QUAT_START\nQUAT_STOP\n=\n[\nX = ]")
	f.Fuzz(func(t *testing.T, text string) {
		for _, found := range CheckParameters("a.kvn", []byte(text)) {
			require.Positive(t, found.Place.Line)
			require.LessOrEqual(t, found.Place.Column, found.Place.EndColumn)
		}
	})
}
