//! A browser by its driver: as much of the `WebDriver` protocol as the tests of the page need.

use std::{
    io::{BufRead, BufReader, Read, Write},
    net::TcpStream,
    path::Path,
    process::{Child, Command, Stdio},
    time::Duration,
};

use base64::{Engine as _, engine::general_purpose::STANDARD};
use serde_json::{Value, json};

/// What a page may take to answer, s.
const PATIENCE: Duration = Duration::from_secs(60);

/// A browser with one window.
pub struct Browser {
    driver: Child,
    port: u16,
    session: String,
}

impl Browser {
    /// Starts a browser; none on a machine without a driver, which is told, and is a failure where
    /// `RINGSUM_BROWSER` is `required`.
    pub fn start() -> Option<Self> {
        let started = Command::new("chromedriver")
            .arg("--port=0")
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .spawn();
        let mut driver = match started {
            Ok(driver) => driver,
            Err(found) => {
                let required =
                    std::env::var("RINGSUM_BROWSER").is_ok_and(|word| word == "required");
                assert!(!required, "chromedriver cannot be started: {found}");
                // Past the capture of the test harness, so that it is told where a test passes.
                let _ = writeln!(
                    std::io::stderr(),
                    "skipped, not checked: the page in a browser (no chromedriver; RINGSUM_BROWSER=required makes this a failure)"
                );
                return None;
            }
        };
        let lines = BufReader::new(driver.stdout.take().expect("its output"));
        let port = lines.lines().map_while(Result::ok).find_map(|line| {
            let (_, rest) = line.split_once("successfully on port ")?;
            rest.trim_end_matches('.').parse().ok()
        });
        let mut browser = Self {
            driver,
            port: port.expect("a port"),
            session: String::new(),
        };
        let asked = json!({ "capabilities": { "alwaysMatch": {
            "browserName": "chrome",
            "goog:chromeOptions": { "args": [
                "--headless=new", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage", "--hide-scrollbars",
            ] },
            "goog:loggingPrefs": { "browser": "ALL" },
        } } });
        let session = browser.call("POST", "/session", &asked);
        let id = session["sessionId"].as_str();
        browser.session = format!("/session/{}", id.expect("a session"));
        Some(browser)
    }

    /// Opens a file.
    pub fn open(&self, page: &Path) {
        let page = page.canonicalize().expect("the page is there");
        let url = json!({ "url": format!("file://{}", page.display()) });
        self.post("/url", &url);
    }

    /// What a script returns.
    pub fn run(&self, script: &str) -> Value {
        self.post("/execute/sync", &json!({ "script": script, "args": [] }))
    }

    /// A command of the browser's own protocol.
    pub fn tell(&self, command: &str, parameters: &Value) -> Value {
        let asked = json!({ "cmd": command, "params": parameters });
        self.post("/goog/cdp/execute", &asked)
    }

    /// Makes the window so wide, in pixels.
    pub fn width(&self, pixels: u32) {
        let size =
            json!({ "width": pixels, "height": 900, "deviceScaleFactor": 1, "mobile": false });
        self.tell("Emulation.setDeviceMetricsOverride", &size);
    }

    /// The page on A4 as PDF, not shrunk to fit.
    pub fn printed(&self) -> Vec<u8> {
        let asked = json!({ "shrinkToFit": false, "page": { "width": 21.0, "height": 29.7 } });
        let pdf = self.post("/print", &asked);
        let text = pdf.as_str().expect("a document");
        STANDARD.decode(text).expect("base64")
    }

    /// Everything the console holds.
    pub fn console(&self) -> Value {
        self.post("/se/log", &json!({ "type": "browser" }))
    }

    fn post(&self, path: &str, body: &Value) -> Value {
        self.call("POST", &format!("{}{path}", self.session), body)
    }

    /// One request, one answer: HTTP/1.1 on a socket of its own.
    fn call(&self, method: &str, path: &str, body: &Value) -> Value {
        let body = body.to_string();
        let mut socket = TcpStream::connect(("127.0.0.1", self.port)).expect("the driver listens");
        socket.set_read_timeout(Some(PATIENCE)).expect("a time");
        write!(
            socket,
            "{method} {path} HTTP/1.1\r\nHost: 127.0.0.1:{}\r\nContent-Type: application/json\r\nContent-Length: {}\r\nConnection: close\r\n\r\n{body}",
            self.port,
            body.len()
        )
        .expect("the driver reads");
        let mut answer = BufReader::new(socket);
        let mut length = 0;
        loop {
            let mut line = String::new();
            answer.read_line(&mut line).expect("a heading");
            let line = line.trim_end();
            if line.is_empty() {
                break;
            }
            if let Some((name, value)) = line.split_once(':')
                && name.eq_ignore_ascii_case("content-length")
            {
                length = value.trim().parse().expect("a length");
            }
        }
        let mut bytes = vec![0; length];
        answer.read_exact(&mut bytes).expect("an answer");
        let mut answer: Value = serde_json::from_slice(&bytes).expect("JSON");
        let value = answer["value"].take();
        assert!(value["error"].is_null(), "{path}: {value}");
        value
    }
}

impl Drop for Browser {
    fn drop(&mut self) {
        if !self.session.is_empty() && !std::thread::panicking() {
            self.call("DELETE", &self.session, &json!({}));
        }
        // It may have ended by itself.
        let _ = self.driver.kill();
        let _ = self.driver.wait();
    }
}
