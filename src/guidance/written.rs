//! A limit or a time as a file writes it, in the exposure time `t`.
use super::metric::Metric;

/// An expression in `t`.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Written {
    node: evalexpr::Node,
}
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Wanted {
    Time,
    Limit(Metric),
}

/// What is wrong with a written text, and at which character from 1.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Wrong {
    pub(super) message: String,
}

impl Written {
    pub(super) fn read(text: &str, _wanted: Wanted) -> Result<Self, Wrong> {
        let plain = text
            .replace(" kW/m²", "e3")
            .replace(" W/m²", ".0")
            .replace(" J/m²", ".0")
            .replace(" s", ".0");
        let node = evalexpr::build_operator_tree(&plain).map_err(|e| Wrong {
            message: e.to_string(),
        })?;
        Ok(Self { node })
    }
    pub(super) fn at(&self, t: f64) -> Option<f64> {
        use evalexpr::ContextWithMutableVariables;
        let mut context: evalexpr::HashMapContext = evalexpr::HashMapContext::new();
        context
            .set_value("t".into(), evalexpr::Value::Float(t))
            .ok()?;
        self.node.eval_number_with_context(&context).ok()
    }
    pub(super) fn constant(text: &str) -> Result<f64, Wrong> {
        Self::read(text, Wanted::Time)?
            .at(f64::NAN)
            .filter(|v| v.is_finite())
            .ok_or(Wrong {
                message: "expected a time".into(),
            })
    }
}
