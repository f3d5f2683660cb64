package revision

import (
	"bytes"
	"context"
	"flag"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"dextral/rules"
	"dextral/rules/report"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/txtar"
)

var update = flag.Bool("update", false, "rewrite what the cases of testdata expect")

// Each case is an archive: prose, the files before, the files after, and what a
// review says without its first line and its closing lines.
func TestCases(t *testing.T) {
	names, err := filepath.Glob("testdata/*.txtar")
	require.NoError(t, err)
	require.NotEmpty(t, names)
	for _, name := range names {
		t.Run(strings.TrimSuffix(filepath.Base(name), ".txtar"), func(t *testing.T) {
			full, err := filepath.Abs(name)
			require.NoError(t, err)
			archive, err := txtar.ParseFile(full)
			require.NoError(t, err)
			repo := newRepo(t)
			repo.fill(archive, "before/")
			repo.commit()
			repo.empty()
			repo.fill(archive, "after/")
			repo.git("add", "-A") // so that renames are seen
			got := essence(t, repo.review(Options{Base: "HEAD"}))
			if *update {
				archive.Files = append(without(archive, "want"), txtar.File{Name: "want", Data: []byte(got)})
				require.NoError(t, os.WriteFile(full, txtar.Format(archive), 0o644))
				return
			}
			assert.Equal(t, file(archive, "want"), got, string(archive.Comment))

			fits(t, repo.review(Options{Base: "HEAD"}))

			repo.commit() // two commits say what a commit and the working tree say
			assert.Equal(t, got, essence(t, repo.review(Options{Base: "HEAD~1", Head: "HEAD"})))
		})
	}
}

// essence is the text of a review without its title and caution.
func essence(t *testing.T, r *report.Review) string {
	t.Helper()
	var b strings.Builder
	require.NoError(t, report.ReviewText(&b, r, report.Options{}))
	lines := strings.Split(b.String(), "\n")
	kept := lines[2:]
	for i, l := range kept {
		if strings.HasPrefix(l, "gate ") {
			kept = kept[:i]
			break
		}
	}
	return strings.Join(kept, "\n") + "\n"
}

// fits holds the JSON of a review against its schema.
func fits(t *testing.T, r *report.Review) {
	t.Helper()
	schema, err := jsonschema.UnmarshalJSON(bytes.NewReader(report.ReviewSchema))
	require.NoError(t, err)
	c := jsonschema.NewCompiler()
	require.NoError(t, c.AddResource("review.json", schema))
	compiled, err := c.Compile("review.json")
	require.NoError(t, err)
	var b bytes.Buffer
	require.NoError(t, report.ReviewJSON(&b, r))
	doc, err := jsonschema.UnmarshalJSON(&b)
	require.NoError(t, err)
	assert.NoError(t, compiled.Validate(doc))
}

func file(a *txtar.Archive, name string) string {
	for _, f := range a.Files {
		if f.Name == name {
			return string(f.Data)
		}
	}
	return ""
}

func without(a *txtar.Archive, name string) []txtar.File {
	var kept []txtar.File
	for _, f := range a.Files {
		if f.Name != name {
			kept = append(kept, f)
		}
	}
	return kept
}

// repo is a git repository in a temporary directory, which is the working
// directory of the test.
type repo struct {
	*testing.T
	dir string
}

func newRepo(t *testing.T) *repo {
	t.Helper()
	if _, err := exec.LookPath("git"); err != nil {
		t.Skip("the git command is not here")
	}
	t.Setenv("GIT_CONFIG_GLOBAL", os.DevNull)
	t.Setenv("GIT_CONFIG_SYSTEM", os.DevNull)
	r := &repo{t, t.TempDir()}
	t.Chdir(r.dir)
	r.git("init", "-q", "-b", "main")
	r.git("config", "user.name", "Tern")
	r.git("config", "user.email", "tern@example.org")
	r.git("config", "core.autocrlf", "false")
	return r
}

func (r *repo) git(args ...string) string {
	r.Helper()
	c := exec.Command("git", args...)
	c.Dir = r.dir
	out, err := c.CombinedOutput()
	require.NoError(r, err, string(out))
	return strings.TrimSpace(string(out))
}

func (r *repo) write(name, text string) {
	r.Helper()
	name = filepath.Join(r.dir, filepath.FromSlash(name))
	require.NoError(r, os.MkdirAll(filepath.Dir(name), 0o755))
	require.NoError(r, os.WriteFile(name, []byte(text), 0o644))
}

func (r *repo) fill(a *txtar.Archive, prefix string) {
	for _, f := range a.Files {
		if name, ok := strings.CutPrefix(f.Name, prefix); ok {
			r.write(name, string(f.Data))
		}
	}
}

// empty removes the files of the working tree.
func (r *repo) empty() {
	entries, err := os.ReadDir(r.dir)
	require.NoError(r, err)
	for _, e := range entries {
		if e.Name() != ".git" {
			require.NoError(r, os.RemoveAll(filepath.Join(r.dir, e.Name())))
		}
	}
}

func (r *repo) commit() {
	r.git("add", "-A")
	r.git("commit", "-q", "--allow-empty", "-m", "tern")
}

func (r *repo) review(o Options) *report.Review {
	r.Helper()
	o.Today = time.Date(2026, 11, 30, 12, 0, 0, 0, time.UTC)
	result, err := Review(context.Background(), o)
	require.NoError(r, err)
	return result
}

const (
	right = "camera:\n  quaternion_wxyz: [0.951549, 0.038135, 0.189308, 0.239298]\n"
	wrong = "camera:\n  quaternion_wxyz: [0.98, 0.10, 0.25, 0.24]\n"
)

func TestNothingIsWritten(t *testing.T) {
	r := newRepo(t)
	r.write("a.yaml", right)
	r.commit()
	r.write("a.yaml", wrong)
	temp := t.TempDir()
	t.Setenv("TMPDIR", temp)
	t.Setenv("TMP", temp) // Windows
	before := r.git("status", "--porcelain", "--ignored")
	index, err := os.Stat(".git/index")
	require.NoError(t, err)
	r.review(Options{Base: "HEAD"})
	assert.Equal(t, before, r.git("status", "--porcelain", "--ignored"))
	after, err := os.Stat(".git/index")
	require.NoError(t, err)
	assert.Equal(t, index.Size(), after.Size())
	left, err := os.ReadDir(temp)
	require.NoError(t, err)
	assert.Empty(t, left)
}

func TestOnlyNewFindingsFail(t *testing.T) {
	r := newRepo(t)
	r.write("old.yaml", wrong)
	r.commit()
	r.write("old.yaml", "# a comment\n"+wrong)
	same := r.review(Options{Base: "HEAD"})
	assert.Empty(t, same.New)
	assert.Len(t, same.Same, 1)
	assert.Zero(t, same.Failing())

	r.write("new.yaml", wrong)
	fresh := r.review(Options{Base: "HEAD"})
	require.Len(t, fresh.New, 1)
	assert.Equal(t, rules.RotorNotUnit, fresh.New[0].Rule)
	assert.Equal(t, 1, fresh.Failing())
}

// A finding on a value whose file and key were both renamed is not new.
func TestFindingsFollowRenames(t *testing.T) {
	r := newRepo(t)
	r.write("old.yaml", strings.Replace(wrong, "camera", "front", 1)+strings.Repeat("# the survey aircraft Tern\n", 9))
	r.commit()
	r.empty()
	r.write("deep/new.yaml", strings.Replace(wrong, "camera", "nose", 1)+strings.Repeat("# the survey aircraft Tern\n", 9))
	got := r.review(Options{Base: "HEAD"})
	assert.Empty(t, got.Fixed)
	if assert.Len(t, got.New, 0) {
		assert.Len(t, got.Same, 1)
	}
}

func TestBelowTheTop(t *testing.T) {
	r := newRepo(t)
	r.write("calib/a.yaml", right)
	r.write("b.yaml", right)
	r.commit()
	r.write("calib/a.yaml", wrong)
	r.write("b.yaml", wrong)
	t.Chdir(filepath.Join(r.dir, "calib"))
	got := r.review(Options{Base: "HEAD"})
	var paths []string
	for _, f := range got.New {
		paths = append(paths, f.Place.Path)
	}
	assert.ElementsMatch(t, []string{"../b.yaml", "a.yaml"}, paths)
}

func TestFork(t *testing.T) {
	r := newRepo(t)
	r.write("a.yaml", right)
	r.write("b.yaml", right)
	r.commit()
	r.git("checkout", "-q", "-b", "trim")
	r.write("a.yaml", strings.Replace(right, "0.239298", "-0.239298", 1))
	r.commit()
	r.git("checkout", "-q", "main")
	r.write("b.yaml", strings.Replace(right, "0.189308", "-0.189308", 1))
	r.commit()
	assert.Len(t, r.review(Options{Base: "main", Head: "trim"}).Changes, 2)
	assert.Len(t, r.review(Options{Base: "main", Head: "trim", Fork: true}).Changes, 1)
}

func TestMissingBase(t *testing.T) {
	r := newRepo(t)
	r.write("a.yaml", right)
	r.commit()
	_, err := Review(context.Background(), Options{Base: "v9"})
	assert.EqualError(t, err, "v9 names no commit of this repository")
	_, err = Review(context.Background(), Options{Base: "--help"})
	assert.EqualError(t, err, "--help names no commit of this repository")

	r.write("a.yaml", wrong)
	r.commit()
	clone := filepath.Join(t.TempDir(), "shallow")
	r.git("clone", "-q", "--depth=1", "file://"+filepath.ToSlash(r.dir), clone)
	t.Chdir(clone)
	_, err = Review(context.Background(), Options{Base: "HEAD~1"})
	assert.ErrorContains(t, err, "HEAD~1 is not in this shallow clone; fetch it first")
}

func TestOutsideOfGit(t *testing.T) {
	t.Chdir(t.TempDir())
	t.Setenv("GIT_CEILING_DIRECTORIES", filepath.Dir(t.TempDir()))
	_, err := Review(context.Background(), Options{Base: "HEAD"})
	assert.ErrorContains(t, err, "no git repository with a working tree here")
}

// Binary and unreadable files, links and submodules are passed over or named.
func TestOddFiles(t *testing.T) {
	r := newRepo(t)
	inner := filepath.Join(t.TempDir(), "inner")
	r.git("init", "-q", "-b", "main", inner)
	r.git("-C", inner, "-c", "user.name=Tern", "-c", "user.email=tern@example.org", "commit", "-q", "--allow-empty", "-m", "one")
	r.write("a.yaml", right)
	r.write("image.bin", "\x00\x01")
	r.git("-c", "protocol.file.allow=always", "submodule", "--quiet", "add", inner, "inner")
	r.commit()
	r.git("-C", "inner", "-c", "user.name=Tern", "-c", "user.email=tern@example.org", "commit", "-q", "--allow-empty", "-m", "two")
	r.write("image.bin", "\x00\x02")
	r.write("b.yaml", strings.Replace(right, "camera", "lidar", 1))
	r.write("broken.yaml", "quaternion: [1, 0\n")
	require.NoError(t, os.Symlink("a.yaml", "link.yaml"))
	got := r.review(Options{Base: "HEAD"})
	require.Len(t, got.LeftOut, 1)
	assert.Equal(t, "inner", got.LeftOut[0].Path)
	require.Len(t, got.Audit.Failed, 1)
	assert.Equal(t, "broken.yaml", got.Audit.Failed[0].Place.Path)
	assert.Len(t, got.Changes, 1)
}

// A file of a rig brings the others of the rig along.
func TestRig(t *testing.T) {
	r := newRepo(t)
	r.write("dextral.toml", "[[rig]]\nname = \"tern\"\nfiles = [\"*.yaml\"]\n")
	r.write("a.yaml", "mount: {parent: body, child: camera, q_wxyz: [0.951549, 0.038135, 0.189308, 0.239298]}\n")
	r.write("b.yaml", "mount: {parent: camera, child: body, q_wxyz: [0.951549, -0.038135, -0.189308, -0.239298]}\n")
	r.commit()
	r.write("b.yaml", "mount: {parent: camera, child: body, q_wxyz: [0.951549, 0.038135, 0.189308, 0.239298]}\n")
	got := r.review(Options{Base: "HEAD"})
	require.Len(t, got.Changes, 1)
	require.NotEmpty(t, got.New)
	assert.Equal(t, 1, got.Files)
}

func FuzzRaw(f *testing.F) {
	f.Add(":100644 100644 aaaa bbbb M\x00a.yaml\x00:100644 100644 aaaa bbbb R100\x00a\x00b\x00")
	f.Add(":000000 100644 0 1 A\x00\x00")
	f.Fuzz(func(t *testing.T, s string) {
		list, err := parseRaw([]byte(s))
		if err == nil && len(s) > 1 {
			assert.LessOrEqual(t, len(list), strings.Count(s, "\x00")+1)
		}
	})
}
