module halfvalue

go 1.26.0

require (
	gioui.org v0.10.3
	github.com/alecthomas/kong v1.17.0
	github.com/go-json-experiment/json v1.27.2
	go.etcd.io/bbolt v1.5.0
	golang.org/x/image v0.40.0
	golang.org/x/mod v0.43.0
	gonum.org/v1/gonum v0.17.0
)

require (
	gioui.org/shader v1.0.9 // indirect
	github.com/go-text/typesetting v0.3.5 // indirect
	github.com/godbus/dbus/v5 v5.2.2 // indirect
	github.com/stretchr/testify v1.12.1 // indirect
	golang.org/x/exp/shiny v0.0.0-20250408133849-7e4ce0ab07d0 // indirect
	golang.org/x/net v0.48.0 // indirect
	golang.org/x/sys v0.45.0 // indirect
	golang.org/x/text v0.37.0 // indirect
)
