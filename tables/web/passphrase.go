package web

import (
	"crypto/subtle"
	"encoding/base64"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode/utf8"

	"golang.org/x/crypto/argon2"
)

// MinPassphrase and MaxPassphrase bound a passphrase, the first in characters, the
// second in bytes.
const (
	MinPassphrase = 12
	MaxPassphrase = 256
)

// Cost of a new hash: the second recommended option of RFC 9106, section 4.
const (
	hashTime    = 3
	hashMemory  = 64 << 10 // KiB
	hashThreads = 4
	hashSalt    = 16
	hashKey     = 32
)

// Hash is the argon2id hash of a passphrase in the form $argon2id$v=19$m=…,t=…,p=…$
// salt$hash, both in unpadded base64. It holds its own cost.
type Hash string

// HashPassphrase hashes secret with a salt from rand. Spaces and line ends around it
// do not count. One that is too short, too long or no line of text is an error,
// which does not show it.
func HashPassphrase(secret []byte, rand io.Reader) (Hash, error) {
	secret, ok := typedSecret(secret)
	switch n := utf8.RuneCount(secret); {
	case !ok:
		return "", errors.New("read a passphrase that cannot be typed, wanted one line of UTF-8 text")
	case n < MinPassphrase:
		return "", fmt.Errorf("read a passphrase of %d characters, wanted at least %d; four words do", n, MinPassphrase)
	case len(secret) > MaxPassphrase:
		return "", fmt.Errorf("read a passphrase of %d bytes, wanted at most %d", len(secret), MaxPassphrase)
	}
	salt := make([]byte, hashSalt)
	if _, err := io.ReadFull(rand, salt); err != nil {
		return "", fmt.Errorf("salt of the passphrase: %w", err)
	}
	h := hashed{memory: hashMemory, time: hashTime, threads: hashThreads, salt: salt}
	h.key = h.of(secret, hashKey)
	return h.text(), nil
}

// ParseHash reads a hash as HashPassphrase writes it. A cost that would stop the
// machine, or that would protect nothing, is refused.
func ParseHash(text string) (Hash, error) {
	h, err := parseHash(strings.TrimSpace(text))
	if err != nil {
		return "", err
	}
	return h.text(), nil
}

// typedSecret is secret as it comes out of a form.
func typedSecret(secret []byte) ([]byte, bool) {
	text, err := cleanValue(string(secret))
	return []byte(text), err == nil
}

// Verify reports whether secret is the passphrase, in a time that does not tell how
// much of it is right. Text that is no hash verifies nothing.
func (h Hash) Verify(secret []byte) bool {
	parsed, err := parseHash(string(h))
	secret, ok := typedSecret(secret)
	if err != nil || !ok || len(secret) > MaxPassphrase {
		return false
	}
	return subtle.ConstantTimeCompare(parsed.of(secret, len(parsed.key)), parsed.key) == 1
}

type hashed struct {
	memory, time uint32
	threads      uint8
	salt, key    []byte
}

func (h hashed) of(secret []byte, length int) []byte {
	return argon2.IDKey(secret, h.salt, h.time, h.memory, h.threads, uint32(length))
}

func (h hashed) text() Hash {
	b64 := base64.RawStdEncoding.EncodeToString
	return Hash(fmt.Sprintf("$argon2id$v=%d$m=%d,t=%d,p=%d$%s$%s", argon2.Version, h.memory, h.time, h.threads, b64(h.salt), b64(h.key)))
}

// parseHash never shows what it read: it stands for a secret.
func parseHash(text string) (hashed, error) {
	parts := strings.Split(text, "$")
	if len(parts) != 6 || parts[0] != "" || parts[1] != "argon2id" || parts[2] != "v="+strconv.Itoa(argon2.Version) {
		return hashed{}, errors.New("the hash of the passphrase cannot be read, wanted $argon2id$v=19$m=…,t=…,p=…$salt$hash")
	}
	var h hashed
	costs := strings.Split(parts[3], ",")
	if len(costs) != 3 {
		return hashed{}, errors.New("the hash of the passphrase has no cost, wanted m=…,t=…,p=…")
	}
	for i, want := range []struct {
		name        string
		least, most uint64
	}{{"m=", 8 << 10, 256 << 10}, {"t=", 1, 10}, {"p=", 1, 16}} {
		digits, named := strings.CutPrefix(costs[i], want.name)
		n, err := strconv.ParseUint(digits, 10, 32)
		if !named || err != nil || n < want.least || n > want.most {
			return hashed{}, fmt.Errorf("the hash of the passphrase has a cost that cannot be used, wanted %s%d to %d", want.name, want.least, want.most)
		}
		switch i {
		case 0:
			h.memory = uint32(n)
		case 1:
			h.time = uint32(n)
		default:
			h.threads = uint8(n)
		}
	}
	var errSalt, errKey error
	h.salt, errSalt = base64.RawStdEncoding.Strict().DecodeString(parts[4])
	h.key, errKey = base64.RawStdEncoding.Strict().DecodeString(parts[5])
	if errSalt != nil || errKey != nil || len(h.salt) < 8 || len(h.salt) > 64 || len(h.key) < 16 || len(h.key) > 64 {
		return hashed{}, errors.New("the hash of the passphrase is cut or changed, wanted a salt of 8 to 64 bytes and a hash of 16 to 64")
	}
	return h, nil
}
