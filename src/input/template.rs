//! A joint file read once, from which joints are made with other values of its parameters.
//!
//! Text, document and schema are done with at [`Template::read`]; each joint repeats the stages from the
//! parameters on, some microseconds beside the milliseconds of its analysis.

use super::faults::{Faults, Origin};
use super::parameters::{self, Parameters};
use super::quantity::{Quantity, number};
use super::schema::File;
use super::{Options, check, document, schema};
use crate::diagnostic::Diagnostic;
use crate::model::Joint;

/// A joint file without faults, with its parameters still open.
#[derive(Debug, Clone)]
pub struct Template {
    file: String,
    text: String,
    options: Options,
    schema: File,
    parameters: Parameters,
    joint: Joint,
}

impl Template {
    /// Reads a joint file; `file` is its name, for messages and the default title.
    ///
    /// # Errors
    /// Every fault of the file as it stands and of the overrides, at least one, in the order of the file.
    pub fn read(file: &str, text: &str, options: &Options) -> Result<Self, Vec<Diagnostic>> {
        let mut faults = Faults::new(file, text);
        let read = Self::collect(file, text, options, &mut faults);
        finished(read, faults)
    }

    fn collect(file: &str, text: &str, options: &Options, faults: &mut Faults<'_>) -> Option<Self> {
        let document = document::read(text, faults)?;
        let mut schema = schema::read(&document, faults);
        parameters::override_with(&mut schema.parameters, &options.set, faults);
        let parameters = parameters::resolve(&schema.parameters, faults);
        let joint = check::joint(file, &schema, &parameters, options, faults)?;
        let (file, text, options) = (file.to_owned(), text.to_owned(), options.clone());
        Some(Self { file, text, options, schema, parameters, joint })
    }

    /// The joint as the file (with its overrides) stands.
    #[must_use]
    pub fn as_given(&self) -> &Joint {
        &self.joint
    }

    pub(super) fn into_joint(self) -> Joint {
        self.joint
    }

    /// The joint with other values of some parameters, each in N, mm, rad and their products, of the dimension
    /// that the parameter has in the file.
    ///
    /// # Errors
    /// A name that is no parameter, and every fault the file has with these values.
    pub fn joint(&self, values: &[(&str, f64)]) -> Result<Joint, Vec<Diagnostic>> {
        let mut faults = self.faults();
        let mut entries = self.schema.parameters.clone();
        for (name, value) in values {
            let origin = Origin::Option { name: "--vary", text: format!("{name}={}", number(*value)) };
            let own = self.parameter(name).unwrap_or(Quantity::pure(0.0));
            let quantity = Quantity { value: *value, ..own };
            parameters::give(&mut entries, name, quantity, origin, &mut faults);
        }
        let parameters = parameters::resolve(&entries, &mut faults);
        let joint = check::joint(&self.file, &self.schema, &parameters, &self.options, &mut faults);
        finished(joint, faults)
    }

    /// An empty list of faults of this file.
    pub(super) fn faults(&self) -> Faults<'_> {
        Faults::new(&self.file, &self.text)
    }

    /// The parameters as the file stands.
    pub(super) fn parameters(&self) -> &Parameters {
        &self.parameters
    }

    /// The value of a parameter as the file stands.
    pub(super) fn parameter(&self, name: &str) -> Option<Quantity> {
        self.parameters.get(name)
    }
}

/// What was read, when there is no fault.
pub(super) fn finished<T>(read: Option<T>, mut faults: Faults<'_>) -> Result<T, Vec<Diagnostic>> {
    match read {
        Some(read) if faults.is_empty() => Ok(read),
        _ => {
            if faults.is_empty() {
                faults.whole("the file cannot be read");
            }
            Err(faults.finish())
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::catalog::DEMO;
    use crate::input::read_joint;

    fn template() -> Template {
        Template::read("demo.toml", DEMO, &Options::default()).unwrap()
    }

    #[test]
    fn another_value_makes_the_joint_that_set_makes() {
        let set = vec![("arm".to_owned(), "333.25 mm".to_owned()), ("depth".to_owned(), "200 mm".to_owned())];
        let expected = read_joint("demo.toml", DEMO, &Options { set, ..Options::default() }).unwrap();
        assert_eq!(template().joint(&[("arm", 333.25), ("depth", 200.0)]).unwrap(), expected);
        assert_eq!(template().joint(&[]).unwrap(), *template().as_given());
    }

    #[test]
    fn faults_of_a_value_are_those_of_the_file() {
        let faults = template().joint(&[("depth", 0.0)]).unwrap_err();
        assert!(faults[0].to_string().contains("demo.toml:32"), "{}", faults[0]);
        let faults = template().joint(&[("dept", 0.0)]).unwrap_err();
        assert!(faults[0].to_string().starts_with("--vary: in `dept=0`: the file has no parameter"));
    }
}
