package web

import (
	"crypto/ecdsa"
	"crypto/elliptic"
	"crypto/sha256"
	"crypto/tls"
	"crypto/x509"
	"crypto/x509/pkix"
	"encoding/pem"
	"errors"
	"fmt"
	"io"
	"math/big"
	"net/netip"
	"strings"
	"time"
)

// validity is how long a new certificate lasts.
const validity = 365 * 24 * time.Hour

// NewCertificate makes a self-signed certificate for hosts, names or addresses, and
// its key (ECDSA on P-256), both in PEM, valid for a year from an hour before now
// (clocks differ). fingerprint is the SHA-256 of the certificate as hex pairs with
// colons, to compare with what the browser shows on first use.
func NewCertificate(hosts []string, now time.Time, rand io.Reader) (certPEM, keyPEM []byte, fingerprint string, err error) {
	if len(hosts) == 0 {
		return nil, nil, "", errors.New("read no host, wanted the names or addresses that the certificate is for")
	}
	serial := make([]byte, 16)
	if _, err := io.ReadFull(rand, serial); err != nil {
		return nil, nil, "", fmt.Errorf("serial number of the certificate: %w", err)
	}
	serial[0] = serial[0]&0x7f | 0x40 // positive, and 16 bytes long
	c := x509.Certificate{
		SerialNumber:          new(big.Int).SetBytes(serial),
		Subject:               pkix.Name{CommonName: "gylebook"},
		NotBefore:             now.Add(-time.Hour).UTC(),
		NotAfter:              now.Add(validity).UTC(),
		KeyUsage:              x509.KeyUsageDigitalSignature,
		ExtKeyUsage:           []x509.ExtKeyUsage{x509.ExtKeyUsageServerAuth},
		BasicConstraintsValid: true,
	}
	for _, name := range hosts {
		host, ok := hostOf(name)
		if !ok {
			return nil, nil, "", fmt.Errorf("read host %.80q, wanted a name or an address, as cellar.example or 192.0.2.7", name)
		}
		if ip, err := netip.ParseAddr(host); err == nil {
			c.IPAddresses = append(c.IPAddresses, ip.AsSlice())
		} else {
			c.DNSNames = append(c.DNSNames, host)
		}
	}
	key, err := ecdsa.GenerateKey(elliptic.P256(), rand)
	if err != nil {
		return nil, nil, "", fmt.Errorf("key of the certificate: %w", err)
	}
	der, err := x509.CreateCertificate(rand, &c, &c, key.Public(), key)
	if err != nil {
		return nil, nil, "", fmt.Errorf("certificate: %w", err)
	}
	private, err := x509.MarshalPKCS8PrivateKey(key)
	if err != nil {
		return nil, nil, "", fmt.Errorf("key of the certificate: %w", err)
	}
	certPEM = pem.EncodeToMemory(&pem.Block{Type: "CERTIFICATE", Bytes: der})
	keyPEM = pem.EncodeToMemory(&pem.Block{Type: "PRIVATE KEY", Bytes: private})
	return certPEM, keyPEM, Fingerprint(der), nil
}

// Fingerprint is the SHA-256 of a certificate in DER as hex pairs with colons.
func Fingerprint(der []byte) string {
	sum := sha256.Sum256(der)
	pairs := make([]string, len(sum))
	for i, b := range sum {
		pairs[i] = fmt.Sprintf("%02X", b)
	}
	return strings.Join(pairs, ":")
}

// ServerTLS is the configuration of a listener (tls.NewListener) with this
// certificate and key, and the fingerprint of the certificate.
func ServerTLS(certPEM, keyPEM []byte) (*tls.Config, string, error) {
	pair, err := tls.X509KeyPair(certPEM, keyPEM)
	if err != nil {
		return nil, "", fmt.Errorf("certificate and key: %w", err)
	}
	return &tls.Config{
		Certificates: []tls.Certificate{pair},
		MinVersion:   tls.VersionTLS12,
		NextProtos:   []string{"h2", "http/1.1"},
	}, Fingerprint(pair.Certificate[0]), nil
}
