//! `report.html`: the model through minijinja.

use base64::Engine;
use base64::engine::general_purpose::STANDARD;
use minijinja::syntax::SyntaxConfig;
use minijinja::value::Serde;
use minijinja::{AutoEscape, Environment, UndefinedBehavior, Value, context};

use super::{ReportError, Template, gate};
use crate::charts::Chart;
use crate::wording::font;

/// The page; charts and fonts stand inside it, so that it is one file.
///
/// # Errors
/// [`ReportError::Template`] where the template is no template or names what the model does not have.
pub(super) fn page(
    mut model: serde_json::Value,
    charts: &[Chart],
    template: &Template,
) -> Result<String, ReportError> {
    let mut environment = Environment::new();
    environment.set_undefined_behavior(UndefinedBehavior::Strict);
    environment.set_auto_escape_callback(|_| AutoEscape::Html);
    let syntax = SyntaxConfig::builder()
        .trim_blocks(true)
        .lstrip_blocks(true)
        .build();
    environment.set_syntax(syntax.map_err(|error| fault(template, &error))?);
    let fault = |error: &minijinja::Error| fault(template, error);
    let page = environment
        .template_from_named_str(&template.name, &template.text)
        .map_err(|error| fault(&error))?;
    let charts: Vec<Value> = charts
        .iter()
        .map(|chart| {
            context! {
                file => chart.file.as_str(),
                title => chart.title.as_str(),
                caption => chart.caption.as_str(),
                svg => Value::from_safe_string(chart.svg.clone()),
            }
        })
        .collect();
    gate::for_browser(&mut model);
    let report = Value::from(Serde(model));
    let encoded = |face: &[u8]| Value::from_safe_string(STANDARD.encode(face));
    let fonts = context! { regular => encoded(font::REGULAR), bold => encoded(font::BOLD) };
    page.render(context! { report, charts, fonts })
        .map_err(|error| fault(&error))
}

fn fault(template: &Template, error: &minijinja::Error) -> ReportError {
    let what = error.detail().map_or_else(
        || error.kind().to_string(),
        |detail| format!("{}: {detail}", error.kind()),
    );
    ReportError::in_template(template, error.range(), what)
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;

    fn made(text: &str, model: serde_json::Value) -> Result<String, ReportError> {
        let template = Template {
            name: "own/report.html".to_owned(),
            text: text.to_owned(),
        };
        page(model, &[], &template)
    }

    #[test]
    fn a_missing_field_is_a_fault_with_its_place() {
        let model = serde_json::json!({"lot": "4471"});
        let fault = made("<p>\n  {{ report.lott }}</p>", model).unwrap_err();
        let ReportError::Template { line, column, .. } = &fault else {
            unreachable!("{fault}")
        };
        assert_eq!((*line, *column), (2, 6));
        assert!(
            fault
                .to_string()
                .starts_with("template `own/report.html`, line 2, column 6: undefined value")
        );
    }

    #[test]
    fn a_broken_template_is_a_fault_with_its_line() {
        let fault = made("<p>\n{% for %}", serde_json::json!({})).unwrap_err();
        assert!(
            matches!(fault, ReportError::Template { line: 2, .. }),
            "{fault}"
        );
    }

    #[test]
    fn what_a_file_says_is_text() {
        let model = serde_json::json!({"lot": "<script>alert('&')</script>"});
        let page = made("{{ report.lot }}", model).unwrap();
        assert!(!page.contains('<'));
    }
}
