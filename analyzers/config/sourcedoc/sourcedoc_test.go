package sourcedoc

import (
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/config/tree/treetest"
	"dextral/analyzers/source"
)

func outline(t *testing.T, name, text string) string {
	t.Helper()
	d, err := Read(source.New(name, []byte(text)))
	require.NoError(t, err)
	require.NoError(t, treetest.Check(d))
	return strings.ReplaceAll(treetest.Outline(d, d.Roots[0]), Scope+" ", "~")
}

func TestC(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"array":            {"static const double q[4] = { 1.0, -0.5f, +2e-3L, .5 };", `~{q:double [<1.0> <-0.5> <+2e-3> <.5>]}`},
		"matrix":           {"float R[3][3] = {{1, 0, 0},\n {0, 1, 0},\n {0, 0, 1}};", `~{R:float [[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]}`},
		"flat matrix":      {"double R[9] = {\n1, 0, 0, // row\n0, 1, 0, /* row */\n0, 0, 1,\n};", `~{R:double [<1> <0> <0> <0> <1> <0> <0> <0> <1>]}`},
		"designated":       {"quat_t mount = {.w = 1.0f, .x = 0.f, .y = 0, .z = 0};", `~{mount:quat_t {w:<1.0> x:<0.> y:<0> z:<0>}}`},
		"designated index": {"double q[4] = {[0] = 1, [1] = 0, [2] = 0, [3] = 0};", `~{q:double [<1> <0> <0> <0>]}`},
		"nested":           {"cfg_t cfg = {.id = 3, .name = \"nose\", .mount = {.q = {1, 0, 0, 0}, .gain = 2}, .on = true};", `~{cfg:cfg_t {id:<3> name:<> mount:{q:[<1> <0> <0> <0>] gain:<2>} on:<>}}`},
		"list of structs":  {"cfg_t cfg[] = {{\"nose\", {1, 0, 0, 0}}, {\"tail\", {0, 1, 0, 0}}};", `~{cfg:cfg_t [[<> [<1> <0> <0> <0>]] [<> [<0> <1> <0> <0>]]]}`},
		"compound literal": {"q = (quat_t){1, 0, 0, 0};", `~{q:quat_t [<1> <0> <0> <0>]}`},
		"cast":             {"double q[4] = {(double)1, 0, 0, (float)0.5};", `~{q:double [<1> <0> <0> <0.5>]}`},
		"constructor":      {"const Eigen::Quaterniond q_nose(0.5, 0.5, 0.5, 0.5);", `~{q_nose:Eigen::Quaterniond [<0.5> <0.5> <0.5> <0.5>]}`},
		"brace init":       {"tf2::Quaternion q{0, 0, 0, 1};", `~{q:tf2::Quaternion [<0> <0> <0> <1>]}`},
		"auto":             {"auto q = Eigen::Quaternion<double>(1, 0, 0, 0);", `~{q:Eigen::Quaternion [<1> <0> <0> <0>]}`},
		"std array":        {"constexpr std::array<double, 4> q_nose{1.0, 0.0, 0.0, 0.0};", `~{q_nose:std::array [<1.0> <0.0> <0.0> <0.0>]}`},
		"double braces":    {"std::array<double, 4> q{{1, 0, 0, 0}};", `~{q:std::array [<1> <0> <0> <0>]}`},
		"vector":           {"std::vector<double> q = {1, 0, 0, 0};", `~{q:std::vector [<1> <0> <0> <0>]}`},
		"commas":           {"Eigen::Matrix3d R;\nR << 1, 0, 0,\n 0, 1, 0,\n 0, 0, 1;", `~{R:Eigen::Matrix3d [<1> <0> <0> <0> <1> <0> <0> <0> <1>]}`},
		"finished":         {"const Eigen::Matrix3d R = (Eigen::Matrix3d() << 1, 0, 0, 0, 1, 0, 0, 0, 1).finished();", `~{R:Eigen::Matrix3d [<1> <0> <0> <0> <1> <0> <0> <0> <1>]}`},
		"Mat_":             {"cv::Mat R = (cv::Mat_<double>(3, 3) << 1, 0, 0, 0, 1, 0, 0, 0, 1);", `~{R:cv::Mat_ [<1> <0> <0> <0> <1> <0> <0> <0> <1>]}`},
		"defines":          {"#define NOSE_ROLL_DEG 3.5 // deg\n#define NOSE_COUNT 4\n#define Q_NOSE {1, 0, 0, 0}\n#define F(x) {1, x}\n", `~{NOSE_ROLL_DEG:<3.5> Q_NOSE:[<1> <0> <0> <0>]}`},
		"define continued": {"#define Q_NOSE \\\n  {1, 0, \\\n  0, 0}\nint x;", `~{Q_NOSE:[<1> <0> <0> <0>]}`},
		"pi":               {"double rpy[3] = {M_PI/2, -M_PI_2, 30.0*M_PI/180.0};", `~{rpy:double [<M_PI/2> <-M_PI_2> <30.0*M_PI/180.0>]}`},
		"scopes":           {"namespace a { class B : public C { double q[4] = {1, 0, 0, 0}; void f() { double q[4] = {0, 1, 0, 0}; } }; }", `~{:~{:~{q:double [<1> <0> <0> <0>] :~{q:double [<0> <1> <0> <0>]}}}}`},
		"conditional":      {"#ifdef A\ndouble q[4] = {1, 0, 0, 0};\n#else\ndouble q[4] = {0, 1, 0, 0};\n#endif\n", `~{:~{q:double [<1> <0> <0> <0>]} :~{q:double [<0> <1> <0> <0>]}}`},
		"conditional in":   {"double q[4] = {\n#ifdef A\n1, 0, 0, 0\n#else\n0, 1, 0, 0\n#endif\n};\ndouble p[4] = {1, 0, 0, 0};", `~{p:double [<1> <0> <0> <0>]}`},
		"guard":            {"#ifndef A_H\n#define A_H\ndouble q[4] = {1, 0, 0, 0};\n#endif\n", `~{q:double [<1> <0> <0> <0>]}`},
		"computed":         {"double q[4] = {cos(a), 0, 0, sin(a)}; double p[4] = {1, 0, 0, a}; double r[] = {1, 2, 3, 4 * b};", `~{}`},
		"operand":          {"auto q = Quaterniond(1, 0, 0, 0) * p; auto r = Quaterniond(1, 0, 0, 0).inverse();", `~{}`},
		"normalised":       {"Quaterniond q(1, 1, 0, 0);\nq.normalize();\nQuaterniond p(1, 0, 0, 0);", `~{p:Quaterniond [<1> <0> <0> <0>]}`},
		"calls":            {"f(1, 2, 3, 4); return Quaterniond(1, 0, 0, 0); q = f(1, 2, 3, 4);", `~{}`},
		"element":          {"q[3] = {1, 0, 0, 0}; q += {1, 0, 0, 0}; a == b;", `~{}`},
		"hex, separators":  {"double q[4] = {0x1p-2, 1'000.0, 1, 0}; double p[3] = {1, 2, 0x3};", `~{}`},
		"strings":          {`const char *s = "q[4] = {1, 0, 0, 0}"; char c = '{'; auto r = R"x(" q = {1,0,0,0};)x"; double q[4] = {1, 0, 0, 0};`, `~{q:double [<1> <0> <0> <0>]}`},
		"comments":         {"/* double a[4] = {1, 0, 0, 0}; */ // double b[4] = {1, 0, 0, 0};\ndouble q[4] = {1, 0, 0, 0};", `~{q:double [<1> <0> <0> <0>]}`},
		"long":             {"double table[] = {1,2,3,4,5,6,7,8,9,10,11,12,13,14,15,16,17};", `~{}`},
		"members":          {"cfg.mount.roll = 0.5; this->q = {1, 0, 0, 0}; cfg->q = {1, 0, 0, 0};", `~{q:[<1> <0> <0> <0>] q:[<1> <0> <0> <0>]}`},
		"unclosed":         {"double q[4] = {1, 0, 0, 0\n", `~{}`},
		"two declared":     {"double a[3] = {1, 2, 3}, b[3] = {4, 5, 6};", `~{a:double [<1> <2> <3>] b:double [<4> <5> <6>]}`},
		"attributes":       {"__attribute__((aligned(16))) static const float q[4] = {1, 0, 0, 0};", `~{q:float [<1> <0> <0> <0>]}`},
		"const double":     {"const double kRoll = 0.5, kPitch = 0.25;\nstatic constexpr float kYaw = 1.0f;", `~{kRoll:double <0.5> kPitch:double <0.25> kYaw:float <1.0>}`},
		"initialiser list": {"Rig() : q_(1, 0, 0, 0), n_(3) {}", `~{}`},
		"new":              {"auto *q = new Quaterniond(1, 0, 0, 0);", `~{}`},
		"objective C":      {"@implementation A\ndouble q[4] = {1, 0, 0, 0};", `~{q:double [<1> <0> <0> <0>]}`},
		"byte order mark":  {"\ufeffdouble q[4] = {1, 0, 0, 0};\r\ndouble p[4] =\r\n{0, 1, 0, 0};", `~{q:double [<1> <0> <0> <0>] p:double [<0> <1> <0> <0>]}`},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, "m.cpp", c.text)) })
	}
}

func TestPython(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"list":         {"q = [1, 0, 0, 0]\nt = (1.0, -2.0, +3e-1)\n", `~{q:[<1> <0> <0> <0>] t:[<1.0> <-2.0> <+3e-1>]}`},
		"matrix":       {"R = np.array([[1, 0, 0],\n              [0, 1, 0],  # row\n              [0, 0, 1]])\n", `~{R:np.array [[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]}`},
		"dtype":        {"R = np.array([1, 0, 0, 0], dtype=np.float64)\n", `~{R:np.array dtype= [<1> <0> <0> <0>]}`},
		"reshape":      {"R = np.array([1, 0, 0, 0, 1, 0, 0, 0, 1]).reshape(3, 3)\n", `~{R:np.array [<1> <0> <0> <0> <1> <0> <0> <0> <1>]}`},
		"transposed":   {"R = np.array([[1, 0, 0], [0, 1, 0], [0, 0, 1]]).T\n", `~{}`},
		"matrix()":     {"R = np.matrix('1 0; 0 1')\nS = np.mat([[1, 0], [0, 1]])\n", `~{S:np.mat [[<1> <0>] [<0> <1>]]}`},
		"scipy":        {"r = R.from_euler('zyx', [30, 20, 10], degrees=True)\ns = Rotation.from_quat([0, 0, 0, 1])\n", `~{r:R.from_euler zyx degrees=True [<30> <20> <10>] s:Rotation.from_quat [<0> <0> <0> <1>]}`},
		"keywords":     {"q = Quaternion(w=1.0, x=0, y=0, z=0)\n", `~{q:Quaternion {w:<1.0> x:<0> y:<0> z:<0>}}`},
		"dict":         {"MOUNT = {'roll': 1.0, \"pitch\": 2, 'yaw': 3, 'name': 'nose', 'n': {'q': [1, 0, 0, 0]}, 'f(q)': [1, 2]}\n", `~{MOUNT:{roll:<1.0> pitch:<2> yaw:<3> name:<> n:{q:[<1> <0> <0> <0>]} 'f(q)':[<1> <2>]}}`},
		"class":        {"class Rig:\n    q: list = [1, 0, 0, 0]\n    def f(self):\n        self.q = [0, 1, 0, 0]\n\nq = [0, 0, 1, 0]\n", `~{:~{q:[<1> <0> <0> <0>] :~{q:[<0> <1> <0> <0>]}} q:[<0> <0> <1> <0>]}`},
		"one line":     {"if a: q = [1, 0, 0, 0]\nb = 1; q = [0, 1, 0, 0]\n", `~{:~{q:[<1> <0> <0> <0>]} q:[<0> <1> <0> <0>]}`},
		"pi":           {"rpy = [np.pi/2, -math.pi / 4, np.deg2rad(30)]\nq = [math.radians(1), 0.0, np.radians(-2.5)]\n", `~{rpy:[<np.pi/2> <-math.pi / 4> <np.deg2rad(30)>] q:[<math.radians(1)> <0.0> <np.radians(-2.5)>]}`},
		"pi call":      {"rpy = np.deg2rad([10, 20, 30])\n", `~{rpy:np.deg2rad [<10> <20> <30>]}`},
		"constants":    {"NOSE_ROLL = 1.5\nroll = 1.5\nCOUNT = 3\nROLL_DEG = 3\n", `~{NOSE_ROLL:<1.5> ROLL_DEG:<3>}`},
		"doc strings":  {"def f():\n    '''\n    q = [1, 0, 0, 0]\n    '''\n    r = \"\"\"q = [1, 0, 0, 0]\"\"\"\nq = [1, 0, 0, 0]\n", `~{q:[<1> <0> <0> <0>]}`},
		"continued":    {"q = \\\n    [1, 0,\n  0, 0]\nR = [\n    1, 0,\n]\n", `~{q:[<1> <0> <0> <0>] R:[<1> <0>]}`},
		"computed":     {"q = [1, 0, 0, x]\np = [1, 0, 0, 0] * 2\nr = [1] * 4\ns = [1, 0, 0, 0][1:]\nt = [i for i in range(4)]\nu = a + [1, 0, 0, 0]\n", `~{t:[<>]}`},
		"normalised":   {"q = np.array([1, 1, 0, 0])\nq = q / np.linalg.norm(q)\n", `~{}`},
		"normalised 2": {"q = np.array([1, 1, 0, 0])\nq /= np.linalg.norm(q)\np = [1, 0, 0, 0]\n", `~{p:[<1> <0> <0> <0>]}`},
		"f-string":     {"x = f'{q}'\ny = b'a'\nz = r'\\d'\nq = [1, 0, 0, 0]\n", `~{q:[<1> <0> <0> <0>]}`},
		"underscores":  {"q = [1_000, 0, 0, 1j]\np = [1, 0, 0, 0]\n", `~{p:[<1> <0> <0> <0>]}`},
		"tuple":        {"q = 1, 0, 0, 0\np, q = [1, 0], [0, 1]\na = b = [1, 0, 0, 0]\n", `~{}`},
		"comments":     {"# q = [1, 0, 0, 0]\nq = [1, 0, 0, 0]  # xyzw\n", `~{q:[<1> <0> <0> <0>]}`},
		"defaults":     {"def f(q=[1, 0, 0, 0], r=3):\n    pass\nf(q=[1, 0, 0, 0])\n", `~{}`},
		"repeated":     {"q = [1, 0, 0, 0]\nq = [0, 1, 0, 0]\n", `~{q:[<1> <0> <0> <0>] q:[<0> <1> <0> <0>]}`},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, "m.py", c.text)) })
	}
}

func TestMatlab(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"row":         {"q = [1 0 0 -0.5];\np = [1, 0, 0, 0]\n", `~{q:[<1> <0> <0> <-0.5>] p:[<1> <0> <0> <0>]}`},
		"matrix":      {"R = [1 0 0; 0 1 0; 0 0 1];\n", `~{R:[[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]}`},
		"lines":       {"R = [1 0 0\n     0 1 0 % row\n     0 0 1];\n", `~{R:[[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]}`},
		"continued":   {"R = [1 0 0; ...\n 0 1 0; ... second\n 0 0 1];\n", `~{R:[[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]}`},
		"signs":       {"q = [1 -2 +3 - 4];\np = [1 - 2 3];\nr = [1 -2, 3];\n", `~{r:[<1> <-2> <3>]}`},
		"transposed":  {"q = [1 0 0 0]';\nR = [1 0; 0 1]';\n", `~{q:[<1> <0> <0> <0>]}`},
		"field":       {"rig.nose.q = [1 0 0 0];\nrig.nose.roll = 1.5;\nroll = 1.5;\n", `~{rig.nose.q:[<1> <0> <0> <0>] rig.nose.roll:<1.5>}`},
		"pi":          {"rpy = [pi/2 -pi/4 deg2rad(30)];\nq = [pi/2, 0, 1];\nr = [0 pi 0];\ns = [10 20 30]*pi/180;\n", `~{rpy:[<pi/2> <-pi/4> <deg2rad(30)>] q:[<pi/2> <0> <1>] r:[<0> <pi> <0>]}`},
		"call":        {"q = quaternion(1, 0, 0, 0);\nR = eul2rotm([0.1 0.2 0.3]);\n", `~{q:quaternion [<1> <0> <0> <0>]}`},
		"function":    {"function R = nose(x)\nR = [1 0 0; 0 1 0; 0 0 1];\nend\nfunction tail\nq = [1 0 0 0];\n", `~{:~{R:[[<1> <0> <0>] [<0> <1> <0>] [<0> <0> <1>]]} :~{q:[<1> <0> <0> <0>]}}`},
		"blocks":      {"if a\n q = [1 0 0 0];\nelse\n q = [0 1 0 0];\nend\nq = [0 0 1 0];\n", `~{:~{q:[<1> <0> <0> <0>]} :~{q:[<0> <1> <0> <0>]} q:[<0> <0> <1> <0>]}`},
		"comments":    {"% q = [1 0 0 0]\n%{\nq = [1 0 0 0];\n%}\nq = [1 0 0 0]; % wxyz\n# octave\n", `~{q:[<1> <0> <0> <0>]}`},
		"strings":     {"s = 'q = [1 0 0 0]';\nt = \"[\";\nu = a';\nq = [1 0 0 0];\n", `~{q:[<1> <0> <0> <0>]}`},
		"element":     {"q(1) = 3;\nR(1,:) = [1 0 0];\nq = x(1:4);\nif q == [1 0 0 0], end\n", `~{}`},
		"names":       {"q = [a b c d];\nr = [1 0 x];\n", `~{}`},
		"cell":        {"c = {1, 2, 3};\n", `~{}`},
		"normalised":  {"q = [1 1 0 0];\nq = q/norm(q);\n", `~{}`},
		"rows uneven": {"R = [1 0 0; 0 1];\n", `~{R:[[<1> <0> <0>] [<0> <1>]]}`},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, "m.m", c.text)) })
	}
}

// Texts that never close a bracket, or open very many, are read in linear time.
func TestBounded(t *testing.T) {
	for _, c := range []struct{ name, unit string }{
		{"m.c", "{"}, {"m.c", "q = {"}, {"m.c", "("}, {"m.c", "q = (a){"}, {"m.c", "f(1, 2, {3, "}, {"m.c", "#if A\n"}, {"m.c", "#if A\n#else\n"}, {"m.c", "namespace a {"},
		{"m.c", "a<"}, {"m.c", "double q[4] = {1, 0, 0, 0};\n"}, {"m.c", "q q q "}, {"m.c", "x = norm(a);"}, {"m.c", "/*"}, {"m.c", "/* a\n"}, {"m.c", "#define A {\\\n"},
		{"m.py", "q = ["}, {"m.py", "["}, {"m.py", "if a:\n"}, {"m.py", "if a: "}, {"m.py", " def f(a, b=[1, 2"}, {"m.py", "q = [1, 0, 0, 0]\n"}, {"m.py", "'''"}, {"m.py", "q = f(q = f("},
		{"m.m", "q = ["}, {"m.m", "if a\n"}, {"m.m", "q = [1 0 0 0];\n"}, {"m.m", "'"}, {"m.m", "%{\n"}, {"m.m", "q = [1 0 0\n"}, {"m.m", "a."},
	} {
		text := strings.Repeat(c.unit, 200_000/len(c.unit))
		start := time.Now()
		_, err := Read(source.New(c.name, []byte(text)))
		assert.NoError(t, err)
		assert.Less(t, time.Since(start), 20*time.Second, "%q", c.unit)
	}
}

func TestIsTest(t *testing.T) {
	for name, want := range map[string]bool{
		"a/test_nose.py": true, "a/nose_test.cc": true, "tests/nose.c": true, "a/NoseTest.cpp": true, "conftest.py": true, `a\Test\nose.c`: true,
		"a/nose.py": false, "latest/nose.c": false, "attest.m": false, "a/contest.c": false, "protest.py": false,
	} {
		assert.Equal(t, want, IsTest(name), name)
	}
	d, err := Read(source.New("test_nose.py", []byte("q = [1, 0, 0, 0]\n")))
	require.NoError(t, err)
	assert.Empty(t, d.Roots[0].Entries)
}

// FuzzRead holds the laws of trees, and that a source is never refused.
func FuzzRead(f *testing.F) {
	for _, text := range []string{
		"static const double q[4] = { 1.0, -0.5f, +2e-3L, .5 }; // x\n", "quat_t m = {.w = (float)1.0f, .x = 0}; R << 1, 0,\n 0;", "#define A {1, \\\n 2}\n#if B\n#else\n}\n#endif\n",
		"auto q = (Eigen::Matrix3d() << 1, 0).finished(); char c = '\\''; R\"a(b)a\";", "q = np.array([[1, 0], [M_PI/2, np.deg2rad(3)]], dtype=float)\nif a: b = {'w': 1}\n",
		"class A:\n    q: list = (1, 2)\n\"\"\"x\"\"\"\nr = R.from_euler('zyx', [1, 2, 3], degrees=True)\n", "R = [1 0; ...\n -pi/2 deg2rad(3)]';\n%{\nx\n%}\nfunction a\nend\n",
	} {
		for kind := range byte(3) {
			f.Add(kind, []byte(text))
		}
	}
	f.Fuzz(func(t *testing.T, kind byte, text []byte) {
		d, err := Read(source.New([]string{"m.c", "m.py", "m.m"}[kind%3], text))
		require.NoError(t, err)
		require.NoError(t, treetest.Check(d))
	})
}
