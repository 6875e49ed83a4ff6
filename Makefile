# make demo   cards, workbook and plan of the demo plant in out/
# make test   every test, fetching the programs that tests check against
# make bench  speed and memory
GO ?= go
DEMO = testdata/demo/tarn40.yaml testdata/demo/tarn40-pipework.yaml

.PHONY: build demo test tools lint bench fuzz clean

build:
	CGO_ENABLED=0 $(GO) build -trimpath -o bin/clampback ./cmd/clampback

# The demo plant holds one infeasible joint on purpose: status 1 is its result.
demo: build
	mkdir -p out
	bin/clampback plan $(DEMO) > out/plan.txt; test $$? -le 1
	bin/clampback plan --format json $(DEMO) > out/plan.json; test $$? -le 1
	bin/clampback card $(DEMO) --out out/cards --with-diagram; test $$? -le 1
	bin/clampback card $(DEMO) --together out/cards.pdf --with-diagram --show-infeasible; test $$? -le 1
	bin/clampback sheet $(DEMO) --out out/tarn40.xlsx; test $$? -le 1
	@echo "see out/cards.pdf, out/tarn40.xlsx, out/plan.txt"

test: tools
	$(GO) vet ./...
	CI=true $(GO) test ./...

# Independent programs that tests compare with; Debian packages.
tools:
	.ci/fetch-tools

lint:
	$(GO) tool -modfile=.ci/tools.mod golangci-lint run

bench:
	$(GO) test -run '^$$' -bench . -benchmem ./...

# Each parser for a while; FUZZTIME=10m for a night.
FUZZTIME ?= 20s
fuzz:
	.ci/fuzz $(FUZZTIME)

clean:
	rm -rf bin out
