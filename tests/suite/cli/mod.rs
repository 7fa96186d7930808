//! The command line as a user meets it: the binary is run, its status, output and messages are read.

mod figures;
mod files;
mod formats;
mod selfcheck;
mod sweeps;
mod verdicts;

use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

/// Two vertical lines that carry 60 kN at 200 mm from their centroid with ease.
const BRACKET: &str = r#"title = "Two lines"
units = "metric"
rules = "aisc-360-22-lrfd"

[filler]
strength = 490

[parameters]
p = "60 kN"

[[weld]]
name = "left"
leg = 6
path = [[0, 0], [0, 200]]

[[weld]]
name = "right"
leg = 6
path = [[100, 0], [100, 200]]

[[load]]
case = "crane"
at = [250, 100]
force = [0, "-p"]

[[load]]
case = "wind"
at = [50, 100]
force = [10, 0]
"#;

/// What one run of the program gave.
struct Outcome {
    status: Option<i32>,
    stdout: String,
    stderr: String,
}

impl Outcome {
    /// Asserts the exit status, showing what was said otherwise.
    fn ends_with(self, status: i32) -> Self {
        assert_eq!(self.status, Some(status), "stdout:\n{}\nstderr:\n{}", self.stdout, self.stderr);
        self
    }

    fn json(&self) -> serde_json::Value {
        serde_json::from_str(&self.stdout).unwrap_or_else(|error| panic!("{error}:\n{}", self.stdout))
    }
}

/// An empty directory of one test's own.
struct Desk {
    directory: PathBuf,
}

impl Desk {
    fn new(test: &str) -> Self {
        let directory = Path::new(env!("CARGO_TARGET_TMPDIR")).join("cli").join(test);
        let _ = fs::remove_dir_all(&directory);
        fs::create_dir_all(&directory).unwrap();
        Self { directory }
    }

    fn put(&self, name: &str, contents: impl AsRef<[u8]>) {
        fs::write(self.directory.join(name), contents).unwrap();
    }

    fn read(&self, name: &str) -> String {
        fs::read_to_string(self.directory.join(name)).unwrap()
    }

    /// Names of the files on the desk, sorted.
    fn names(&self) -> Vec<String> {
        let entries = fs::read_dir(&self.directory).unwrap();
        let mut names: Vec<String> =
            entries.map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect();
        names.sort();
        names
    }

    fn command(&self, arguments: &[&str]) -> Command {
        let mut command = Command::new(env!("CARGO_BIN_EXE_weldpole"));
        command.args(arguments).current_dir(&self.directory).env_remove("COLUMNS").env_remove("NO_COLOR");
        command
    }

    fn run(&self, arguments: &[&str]) -> Outcome {
        self.run_with_input(arguments, b"")
    }

    fn run_with_input(&self, arguments: &[&str], input: &[u8]) -> Outcome {
        let mut child = self
            .command(arguments)
            .stdin(Stdio::piped())
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        // A program that does not read its input closes the pipe; that is its right.
        let _ = child.stdin.take().unwrap().write_all(input);
        let output = child.wait_with_output().unwrap();
        Outcome {
            status: output.status.code(),
            stdout: String::from_utf8(output.stdout).unwrap(),
            stderr: String::from_utf8(output.stderr).unwrap(),
        }
    }
}
