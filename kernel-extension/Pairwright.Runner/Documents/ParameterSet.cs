using System.Globalization;
using Microsoft.CodeAnalysis;
using Microsoft.CodeAnalysis.CSharp;
using Microsoft.CodeAnalysis.CSharp.Syntax;

namespace Pairwright.Runner.Documents;

/// <summary>The variables that a notebook's cell tagged <c>parameters</c> declares, and new values for them.</summary>
internal sealed class ParameterSet
{
    private readonly List<(string Name, string Type, ExpressionSyntax? Initial)> _declared;

    private ParameterSet(List<(string, string, ExpressionSyntax?)> declared) => _declared = declared;

    public IEnumerable<string> Names => _declared.Select(parameter => parameter.Name);

    public static ParameterSet DeclaredIn(string code)
    {
        // Lines for the host (#r, #i, #!) are not C#; the rest must keep its meaning.
        var lines = code.Split('\n').Where(line => !line.TrimStart().StartsWith('#'));
        var root = CSharpSyntaxTree.ParseText(
            string.Join('\n', lines),
            CSharpParseOptions.Default.WithKind(SourceCodeKind.Script)).GetCompilationUnitRoot();

        var declared = new List<(string, string, ExpressionSyntax?)>();
        foreach (var declaration in root.Members.Select(DeclarationIn).OfType<VariableDeclarationSyntax>())
        {
            foreach (var variable in declaration.Variables)
            {
                declared.Add((variable.Identifier.ValueText, declaration.Type.ToString(), variable.Initializer?.Value));
            }
        }
        return new ParameterSet(declared);
    }

    /// <summary>Turns <c>name=value</c> assignments from the command line into a cell of C#, and the plain pairs for the record.</summary>
    /// <exception cref="BadUsageException">A name is not declared, or a value does not fit its type.</exception>
    public string Assign(IReadOnlyList<KeyValuePair<string, string>> values)
    {
        var code = new List<string>();
        foreach (var (name, value) in values)
        {
            var index = _declared.FindIndex(parameter => parameter.Name == name);
            if (index < 0)
            {
                var known = _declared.Count == 0 ? "that cell declares none" : $"that cell declares {string.Join(", ", Names)}";
                throw new BadUsageException($"--set {name}: the cell tagged '{NotebookCell.ParametersTag}' declares no variable {name}; {known}.");
            }
            code.Add($"{name} = {Literal(_declared[index], value)};");
        }
        return string.Join('\n', code);
    }

    /// <summary>Splits <c>NAME=VALUE</c>; the last of several values for one name counts.</summary>
    public static IReadOnlyList<KeyValuePair<string, string>> Split(IEnumerable<string> assignments)
    {
        var values = new List<KeyValuePair<string, string>>();
        foreach (var assignment in assignments)
        {
            var at = assignment.IndexOf('=');
            var name = at < 0 ? assignment : assignment[..at].Trim();
            if (at < 0 || !SyntaxFacts.IsValidIdentifier(name))
            {
                throw new BadUsageException($"--set {assignment} is not of the form NAME=VALUE, for example --set toleranceMm=1.5.");
            }
            values.RemoveAll(pair => pair.Key == name);
            values.Add(new(name, assignment[(at + 1)..]));
        }
        return values;
    }

    private static VariableDeclarationSyntax? DeclarationIn(MemberDeclarationSyntax member) => member switch
    {
        FieldDeclarationSyntax field => field.Declaration,
        GlobalStatementSyntax { Statement: LocalDeclarationStatementSyntax local } => local.Declaration,
        _ => null,
    };

    private static string Literal((string Name, string Type, ExpressionSyntax? Initial) parameter, string value)
    {
        var nullable = parameter.Type.EndsWith('?');
        if (nullable && value.Trim() == "null")
        {
            return "null";
        }

        return KindOf(parameter.Type.TrimEnd('?'), parameter.Initial) switch
        {
            "string" => StringLiteral(value),
            "bool" => value.Trim() is "true" or "false" ? value.Trim() : throw Misfit("true or false"),
            "char" => value.Length == 1 ? SymbolDisplay.FormatLiteral(value[0], quote: true) : throw Misfit("a single character"),
            "int" => Whole(int.TryParse(value, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out var number), number),
            "long" => Whole(long.TryParse(value, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out var number), number) + "L",
            "double" => Real() + "d",
            "float" => Real() + "f",
            "decimal" => Real() + "m",
            _ => OwnLiteral(value),
        };

        BadUsageException Misfit(string wanted) =>
            new($"--set {parameter.Name}={value}: {parameter.Name} takes {wanted}; '{value}' is none.");

        string Whole<T>(bool parsed, T number) =>
            parsed ? FormattableString.Invariant($"{number}") : throw Misfit("a whole number");

        // The text goes on as it is: it keeps every digit that the caller gave.
        string Real() =>
            double.TryParse(value, NumberStyles.Float, CultureInfo.InvariantCulture, out var number) && double.IsFinite(number)
                ? value.Trim().TrimEnd('.')
                : throw Misfit("a number such as 1.5");
    }

    /// <summary>The kind of value a parameter takes; for <c>var</c> the kind of what it was first given.</summary>
    private static string KindOf(string type, ExpressionSyntax? initial)
    {
        if (type != "var")
        {
            return type is "String" or "System.String" ? "string" : type;
        }

        var literal = initial is PrefixUnaryExpressionSyntax { Operand: LiteralExpressionSyntax inner } ? inner : initial as LiteralExpressionSyntax;
        return literal?.Token.Value switch
        {
            string => "string",
            bool => "bool",
            char => "char",
            int => "int",
            long => "long",
            double => "double",
            float => "float",
            decimal => "decimal",
            _ => type,
        };
    }

    /// <summary>A value for a type that we do not know: a C# literal stays what it is, anything else is a string.</summary>
    private static string OwnLiteral(string value)
    {
        var expression = SyntaxFactory.ParseExpression(value);
        var literal = expression is PrefixUnaryExpressionSyntax { Operand: LiteralExpressionSyntax inner } ? inner : expression as LiteralExpressionSyntax;
        return literal is not null && !expression.ContainsDiagnostics && expression.FullSpan.Length == value.Length
            ? value.Trim()
            : SymbolDisplay.FormatLiteral(value, quote: true);
    }

    /// <summary>A string may be given bare, or as a C# string literal with its quotes.</summary>
    private static string StringLiteral(string value) =>
        SyntaxFactory.ParseExpression(value) is LiteralExpressionSyntax { Token.Value: string } literal
            && !literal.ContainsDiagnostics
            && literal.FullSpan.Length == value.Length
                ? value
                : SymbolDisplay.FormatLiteral(value, quote: true);
}
