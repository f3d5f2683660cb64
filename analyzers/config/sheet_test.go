package config

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestSheet(t *testing.T) {
	text := "sensor,parent,child,roll [deg],pitch [deg],yaw [deg],qw,qx,qy,qz\nnose,body,nose_cam,0,0,90,0.7071,0,0,0.7071\ntail,body,tail_cam,1,2,3,1,0,0,0\n"
	assert.Equal(t, "table by name", Recognise("mounts.csv", []byte(text)))
	assert.Equal(t, []string{
		"nose: angles; label degree; label angles; sibling v_body = R v_nose_cam; name roll, pitch, yaw (kind of axes unstated); of nose/",
		"nose: quaternion; label scalar first (w x y z); label quaternion; sibling v_body = R v_nose_cam; of nose/",
		"tail: angles; label degree; label angles; sibling v_body = R v_tail_cam; name roll, pitch, yaw (kind of axes unstated); of tail/",
		"tail: quaternion; label scalar first (w x y z); label quaternion; sibling v_body = R v_tail_cam; of tail/",
	}, summaries(t, "mounts.csv", text))
	matrix := "name,r11,r12,r13,r21,r22,r23,r31,r32,r33\nnose,1,0,0,0,1,0,0,0,1\n"
	assert.Equal(t, []string{"nose.R: rotation matrix; name rotation matrix"}, summaries(t, "mounts.tsv", strings.ReplaceAll(matrix, ",", "\t")))
	for name, text := range map[string]string{
		"a log":          "time,state,roll,pitch,yaw\n1,a,2,3,4\n2,b,2,3,4\n",
		"equal words":    "state,roll,pitch,yaw\na,2,3,4\na,2,3,4\n",
		"no orientation": "name,mass,length,width\nnose,1,2,3\ntail,1,2,3\n",
		"too large":      "name,roll,pitch,yaw\n" + strings.Repeat("# a long remark about the table\n", 2000) + "nose,1,2,3\n",
	} {
		assert.Equal(t, "", Recognise("mounts.csv", []byte(text)), name)
	}
}
