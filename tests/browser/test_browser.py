#!/usr/bin/python3
"""The report in a browser and on paper: headless Chromium on what `vicinal plan` writes.

Checked are a plan that resolves, one that does not, and one whose every text is meant to do harm: nothing is
asked of any network, nothing complains, nothing is wider than a phone, nothing is cut off in print, and what was
typed is text. The last line is `N passed, N failed`; status 1 when any failed.

    tests/browser/test_browser.py BINARY
"""
import html.parser
import http.server
import os
import pathlib
import re
import shutil
import subprocess
import sys
import tempfile
import threading

PHONE = 360
EVIL = "</td></script><script>document.title='owned'</script><img src=x onerror=\\\"document.title='owned'\\\">"
HEAD = """question: {{expect: 1.5 %, against: {against} %, against_is: same-constants}}
plan:
  grade: [middle, high]
  tube: [suspended-0c, suspended-0a]
  bath: [circulator, insulated-beaker, {bath}]
  thermometer: [probe, glass]
  fillings: [1, 2]
  runs: [3, 4]
"""
LONG = "a-bath-with_a_name_that_never_seems_to_come_to_an_end_at_all"
KIT = "kit:\n  baths: [{{name: {name}, like: circulator, price: 3}}]\n"
SCENARIOS = {
    "resolves": HEAD.format(against="1.3", bath="viscometry-bath"),
    "misses": HEAD.format(against="1.48", bath="viscometry-bath"),
    "evil": f'title: "{EVIL} | *a* `b` [l](javascript:alert(1)) ![i](http://127.0.0.1/i.png)"\n'
            + HEAD.format(against="1.3", bath=LONG) + KIT.format(name=LONG) + 'cost: {currency: "<b>|*`_"}\n',
}
FLAGS = ["--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
         "--disable-background-networking", "--disable-component-update", "--disable-sync", "--disable-extensions",
         "--disable-default-apps", "--no-default-browser-check", "--disable-dev-shm-usage",
         "--enable-logging=stderr", "--v=0", "--allow-file-access-from-files",
         "--hide-scrollbars"]
# What the browser says about itself, on a machine without a desktop.
IDLE = re.compile(r"dbus|D-Bus|bus\.cc|gpu|GPU|vulkan|Vulkan|viz|gcm|sandbox|ALSA|udev|font|policy|on_device_model|"
                  r"DevTools|registration_request|USB|bytes written to file|cpu_probe|crashpad|task_manager|"
                  r"network_service|angle|egl|EGL|command_buffer")
# What the browser asks for of its own accord.
OWN = re.compile(r"(^|\.)(google|googleapis|gvt1|gstatic|googleusercontent)\.com$")
RESULTS = []


def check(name, good, shown=""):
    RESULTS.append(bool(good))
    print(f"{'ok  ' if good else 'FAIL'} {name}" + ("" if good else f": {shown}"[:600]))


def chromium(home, *arguments, names="MAP * ~NOTFOUND"):
    """Standard output and error of one run with an empty profile; `names`: where the names of hosts lead."""
    profile = tempfile.mkdtemp(dir=home)
    program = shutil.which("chromium") or "/usr/bin/chromium"
    done = subprocess.run([program, *FLAGS, f"--user-data-dir={profile}", f"--host-resolver-rules={names}",
                           *arguments], capture_output=True, text=True,
                          errors="replace", timeout=180, check=False, env=dict(os.environ, HOME=profile))
    shutil.rmtree(profile, ignore_errors=True)
    return done.stdout, done.stderr


def dom(home, path, *arguments):
    return chromium(home, *arguments, "--virtual-time-budget=3000", "--dump-dom", path.as_uri())


def complaints(log):
    lines = [line for line in log.splitlines() if "CONSOLE" in line or "ERR_" in line or "ERROR" in line]
    return [line for line in lines if "CONSOLE" in line or not IDLE.search(line)]


class Page(html.parser.HTMLParser):
    """What a test wants to know of a page."""

    def __init__(self, text):
        super().__init__(convert_charrefs=True)
        self.tags, self.headings, self.links, self.bad = [], [], [], []
        self.images, self.headers, self.ids, self.cells, self.text = [], [], [], [], ""
        self.open = []
        self.feed(text)

    def handle_starttag(self, tag, attrs):
        attributes = dict(attrs)
        self.tags.append(tag)
        self.open.append(tag)
        if re.fullmatch(r"h[1-6]", tag):
            self.headings.append(int(tag[1]))
        if tag in ("svg", "img"):
            self.images.append(attributes)
        if tag == "th":
            self.headers.append(attributes.get("scope"))
        if "id" in attributes:
            self.ids.append(attributes["id"])
        for name, value in attrs:
            if name in ("href", "src", "xlink:href", "srcset", "action", "data", "poster"):
                self.links.append(value or "")
            if name.startswith("on"):
                self.bad.append(f"{tag} {name}")
        if tag in ("td", "th"):
            self.cells.append("")

    def handle_endtag(self, tag):
        while self.open and self.open.pop() != tag:
            pass

    def handle_data(self, data):
        if "style" in self.open or "script" in self.open:
            return
        self.text += data
        if self.cells and ("td" in self.open or "th" in self.open):
            self.cells[-1] += data


def static(name, text):
    """What can be seen without a browser."""
    page = Page(text)
    check(f"{name}: one main heading, and none is jumped over",
          page.headings.count(1) == 1 and all(b - a <= 1 for a, b in zip(page.headings, page.headings[1:])))
    check(f"{name}: every image says what it shows", page.images and all(
        image.get("role") == "img" and len(image.get("aria-label", "")) > 20 for image in page.images), page.images[:1])
    check(f"{name}: every table header has its scope", page.headers and all(page.headers))
    check(f"{name}: every id stands once", len(set(page.ids)) == len(page.ids),
          [i for i in page.ids if page.ids.count(i) > 1][:5])
    check(f"{name}: links stay in the page",
          all(link.startswith("#") and link[1:] in page.ids for link in page.links),
          [link for link in page.links if link[1:] not in page.ids][:5])
    check(f"{name}: nothing is fetched", not re.search(r"<(link|iframe|img|object|embed|base|form)\b", text)
          and not re.search(r"@import|url\((?!#)", text) and page.tags.count("script") == 1)
    check(f"{name}: no attribute acts", not page.bad, page.bad[:3])


def screens(name, home, path):
    """In a browser: silence, and no wider than a phone."""
    out, log = dom(home, path)
    check(f"{name}: drawn without a complaint", "</html>" in out and not complaints(log), complaints(log)[:3])
    if name != "misses":  # which has no long table
        check(f"{name}: the script has worked", "aria-label=\"Show rows" in out)
    probe = home / f"{name}-probe.html"
    probe.write_text(f"""<!DOCTYPE html><iframe id=f src="{path.as_uri()}" style="width:{PHONE}px;height:3000px;border:0">
</iframe><script>
window.onload = function () {{
  var d = document.getElementById("f").contentDocument, e = d.documentElement;
  var wide = [].filter.call(d.querySelectorAll("body *"), function (n) {{
    return !n.closest(".table") && n.getBoundingClientRect().right > {PHONE} + 0.5; }});
  document.body.innerHTML = "<pre>width=" + e.scrollWidth + " wide=" + wide.length + " " +
    wide.slice(0, 3).map(function (n) {{ return n.tagName; }}) + " title=" + d.title.length + "</pre>";
}};
</script>""")
    out, _ = dom(home, probe, "--disable-web-security")
    found = re.search(r"width=(\d+) wide=(\d+) (\S*)", out)
    check(f"{name}: no horizontal scroll at {PHONE} px", found and int(found[1]) <= PHONE and int(found[2]) == 0,
          found[0] if found else out[-300:])
    for scheme in ("1", "0"):
        _, log = dom(home, path, f"--blink-settings=preferredColorScheme={scheme}")
        check(f"{name}: silent in {'light' if scheme == '1' else 'dark'}", not complaints(log), complaints(log)[:3])


def asked(name, home, path):
    """Served by a machine that goes by every name there is: the page is all that is asked for."""
    seen = []

    class Handler(http.server.BaseHTTPRequestHandler):
        def do_GET(self):
            seen.append((self.headers.get("Host"), self.path))
            page = path.read_bytes() if self.path == "/report.html" else b""
            self.send_response(200 if page else 404)
            self.send_header("Content-Type", "text/html; charset=utf-8")
            self.send_header("Content-Length", str(len(page)))
            self.end_headers()
            self.wfile.write(page)

        def log_message(self, *_):
            pass

    with http.server.ThreadingHTTPServer(("127.0.0.1", 0), Handler) as server:
        threading.Thread(target=server.serve_forever, daemon=True).start()
        chromium(home, "--virtual-time-budget=3000", "--dump-dom", "http://report.test/report.html",
                 names=f"MAP * 127.0.0.1:{server.server_port}")
        server.shutdown()
    page = ("report.test", "/report.html")
    others = [request for request in seen
              if request != page and request[1] != "/favicon.ico" and not OWN.search(request[0] or "")]
    check(f"{name}: nothing is asked of any host", page in seen and not others, seen[:5])


def words(text):
    return re.sub(r"[\s\u00a0\u00ad]+", "", text)


def ink(pdf, page, margin_mm):
    """Whether anything is drawn in the right margin of a page, in mm."""
    raster = subprocess.run(["pdftoppm", "-r", "50", "-gray", "-f", str(page), "-l", str(page), pdf],
                            capture_output=True, check=True).stdout
    _, size, _, pixels = raster.split(b"\n", 3)
    width, height = map(int, size.split())
    first = width - int(margin_mm / 25.4 * 50)
    return any(min(pixels[y * width + first:(y + 1) * width]) < 128 for y in range(height))


def printed(name, home, path, paper):
    """On paper: every cell of every table is there whole, and nothing runs off the right edge."""
    text = path.read_text()
    sized = home / f"{name}-{paper}.html"
    sized.write_text(text.replace("</style>", "@page { size: %s; }</style>" % paper, 1))
    pdf = home / f"{name}-{paper}.pdf"
    chromium(home, "--no-pdf-header-footer", f"--print-to-pdf={pdf}", sized.as_uri())
    check(f"{name}, {paper}: printed", pdf.is_file())
    if not pdf.is_file():
        return
    pages = int(re.search(r"Pages:\s+(\d+)", subprocess.run(["pdfinfo", pdf], capture_output=True, text=True,
                                                            check=True).stdout)[1])
    out = words(subprocess.run(["pdftotext", "-raw", pdf, "-"], capture_output=True, text=True, check=True).stdout)
    cells = {words(cell) for cell in Page(text).cells}
    lost = [cell for cell in cells if cell and cell not in out]
    # a cell whose lines are parted by those of its neighbour may be found piece by piece
    lost = [cell for cell in lost if not all(piece in out for piece in re.findall(r".{1,5}", cell))]
    check(f"{name}, {paper}: no cell is lost on {pages} pages", not lost, lost[:3])
    over = [page for page in range(1, pages + 1) if ink(pdf, page, 12)]
    check(f"{name}, {paper}: nothing runs off the edge", not over, over[:10])


def typed(home, folder):
    out, _ = dom(home, folder / "report.html")
    title = re.search(r"<title>(.*?)</title>", out, re.S)
    check("evil: the title is text", title and "owned" in title[1] and title[1].startswith("&lt;/td&gt;"), title and title[1])
    check("evil: a <script> in a title is text", "&lt;script&gt;document.title='owned'&lt;/script&gt;" in out)
    check("evil: no element was typed", not re.search(r"<(img|b)\b", out) and "<script>document" not in out)


def sorted_and_filtered(home, path):
    """The long table answers to its tools."""
    text = path.read_text()
    probe = home / "tools.html"
    probe.write_text(text.replace("</body>", """<script>
window.addEventListener("load", function () {
  var box = document.querySelector(".tools input"), table = document.querySelector(".tools").nextElementSibling;
  var heads = [].slice.call(table.querySelectorAll("thead th")), hours = heads.findIndex(function (h) {
    return /Hours/.test(h.textContent); });
  function column() { return [].map.call(table.querySelectorAll("tbody tr"), function (r) {
    return parseFloat(r.cells[hours].textContent); }); }
  function rises(a) { return a.every(function (x, i) { return i === 0 || a[i - 1] <= x; }); }
  var button = heads[hours].querySelector("button"), all = column().length;
  button.click();
  var up = rises(column()) && heads[hours].getAttribute("aria-sort") === "ascending";
  button.click();
  var down = rises(column().reverse()) && heads[hours].getAttribute("aria-sort") === "descending";
  box.value = "circulator recommended";
  box.dispatchEvent(new Event("input"));
  var left = table.querySelectorAll("tbody tr:not([hidden])").length;
  document.body.innerHTML = "<pre>up=" + up + " down=" + down + " all=" + (all > 24) + " left=" + left + "</pre>";
});</script></body>"""))
    out, _ = dom(home, probe)
    found = re.search(r"up=true down=true all=true left=(\d+)", out)
    check("resolves: the table of plans can be sorted and filtered", found and int(found[1]) <= 1, out[-200:])


def main():
    binary = os.path.abspath(sys.argv[1])
    with tempfile.TemporaryDirectory() as top:
        home = pathlib.Path(top)
        for name, scenario in SCENARIOS.items():
            path = home / f"{name}.yaml"
            path.write_text(scenario)
            folder = home / name
            done = subprocess.run([binary, "plan", path, "--out", folder, "--studies", "400", "--quiet"],
                                  capture_output=True, text=True, check=False)
            check(f"{name}: planned", done.returncode == (3 if name == "misses" else 0) and not done.stderr,
                  f"{done.returncode} {done.stderr}")
            report = folder / "report.html"
            static(name, report.read_text())
            screens(name, home, report)
            asked(name, home, report)
            for paper in ("A4", "Letter"):
                printed(name, home, report, paper)
        typed(home, home / "evil")
        sorted_and_filtered(home, home / "resolves" / "report.html")
    print(f"{sum(RESULTS)} passed, {len(RESULTS) - sum(RESULTS)} failed")
    return 0 if all(RESULTS) else 1


if __name__ == "__main__":
    sys.exit(main())
