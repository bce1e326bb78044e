module drawup

go 1.26.8

require (
	github.com/boombuler/barcode v1.1.0 // indirect
	github.com/go-pdf/fpdf v0.9.0 // indirect
	github.com/klippa-app/go-pdfium v1.21.4 // indirect
	github.com/makiuchi-d/gozxing v0.1.1 // indirect
	github.com/pelletier/go-toml/v2 v2.4.3 // indirect
	github.com/rogpeppe/go-internal v1.16.0 // indirect
	github.com/spf13/pflag v1.1.0 // indirect
	golang.org/x/xerrors v0.0.0-20200804184101-5ec99f83aff1 // indirect
	pgregory.net/rapid v1.3.0 // indirect
)
