using System.Reflection;
using System.Reflection.Emit;
using Xunit;

namespace Pairwright.Tests.House;

/// <summary>Holds the built library against the layer rule: which room may know which, down to the bodies of methods.</summary>
public sealed class LayerTest
{
    private const string Root = "Pairwright";
    private const string OpenCv = "OpenCvSharp";

    private static readonly Assembly Library = typeof(UserErrorException).Assembly;

    // A room and the rooms that it may know. The root namespace is open to all.
    private static readonly Dictionary<string, string[]> MayKnow = new()
    {
        ["Geometry"] = [],
        ["Imaging"] = ["Geometry"],
        ["Matching"] = ["Geometry", "Imaging"],
        ["Calibration"] = ["Geometry", "Imaging", "Matching"],
        ["Measurement"] = ["Geometry", "Imaging", "Matching"],
        ["Simulation"] = ["Geometry", "Imaging"],
        ["Trials"] = ["Geometry", "Imaging", "Matching", "Calibration", "Measurement", "Simulation"],
    };

    private static readonly string[] MayUseOpenCv = ["Imaging", "Calibration"];

    [Fact]
    public void Every_type_stands_in_the_root_or_in_a_room_of_the_house()
    {
        var strangers = OwnTypes().Where(type => type.Namespace != Root && !MayKnow.ContainsKey(RoomOf(type) ?? "")).Select(type => type.FullName);
        Assert.Empty(strangers);
    }

    [Fact]
    public void No_room_knows_a_room_above_it()
    {
        var offences =
            from type in OwnTypes()
            let room = RoomOf(type)
            where room is not null
            from known in KnownTypes(type)
            where known.Assembly == Library
            let other = RoomOf(known)
            where other is not null && other != room && !MayKnow[room].Contains(other)
            select $"{type.FullName} knows {known.FullName}";
        Assert.Empty(offences.Distinct());
    }

    [Fact]
    public void The_root_knows_no_room()
    {
        var offences =
            from type in OwnTypes()
            where type.Namespace == Root
            from known in KnownTypes(type)
            where known.Assembly == Library && RoomOf(known) is not null
            select $"{type.FullName} knows {known.FullName}";
        Assert.Empty(offences.Distinct());
    }

    [Fact]
    public void The_library_knows_neither_the_notebook_nor_its_host()
    {
        var forbidden = Library.GetReferencedAssemblies()
            .Select(name => name.Name!)
            .Where(name => name.StartsWith("Pairwright", StringComparison.Ordinal) || name.StartsWith("Microsoft.DotNet.Interactive", StringComparison.Ordinal));
        Assert.Empty(forbidden);
    }

    [Fact]
    public void OpenCV_stays_in_its_rooms()
    {
        var offences =
            from type in OwnTypes()
            where !MayUseOpenCv.Contains(RoomOf(type))
            from known in KnownTypes(type)
            where IsOpenCv(known)
            select $"{type.FullName} knows {known.FullName}";
        Assert.Empty(offences.Distinct());
    }

    [Fact]
    public void OpenCV_is_in_no_public_signature()
    {
        const BindingFlags declared = BindingFlags.Public | BindingFlags.NonPublic | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly;
        var offences =
            from type in Library.GetExportedTypes()
            from signature in type.GetMembers(declared).Where(IsVisible).SelectMany(SignatureOf).Concat(HeadOf(type))
            from part in Parts(signature)
            where IsOpenCv(part)
            select $"{type.FullName} shows {part.FullName}";
        Assert.Empty(offences.Distinct());

        static bool IsVisible(MemberInfo member) => member switch
        {
            FieldInfo field => field.IsPublic || field.IsFamily || field.IsFamilyOrAssembly,
            MethodBase method => method.IsPublic || method.IsFamily || method.IsFamilyOrAssembly,
            _ => false,
        };
    }

    [Fact]
    public void No_type_is_named_as_a_namespace()
    {
        string[] rooms = [.. MayKnow.Keys, "Notebook", "Runner", Root];
        Assert.Empty(OwnTypes().Where(type => rooms.Contains(type.Name)).Select(type => type.FullName));
    }

    [Fact]
    public void Every_public_type_stands_alone_in_a_file_of_its_name_in_the_folder_of_its_namespace()
    {
        var folder = LibraryFolder();
        var offences = Library.GetExportedTypes()
            .Where(type => !type.IsNested)
            .Select(type =>
            {
                var parts = type.Namespace!.Split('.').Skip(1);
                return Path.Combine([.. parts, type.Name.Split('`')[0] + ".cs"]);
            })
            .Where(file => !File.Exists(Path.Combine(folder, file)));
        Assert.Empty(offences);
    }

    /// <summary>The test of the test: what stands in the body of a method, or in a function within it, is seen.</summary>
    [Fact]
    public void Knowing_is_found_in_the_bodies_of_methods()
    {
        var known = typeof(Uses).GetNestedTypes(BindingFlags.NonPublic).Append(typeof(Uses)).SelectMany(KnownTypes).ToArray();
        Assert.Contains(typeof(Geometry.RawCurveTests), known);
        Assert.Contains(typeof(OpenCvSharp.Mat), known);
    }

    private static IEnumerable<Type> OwnTypes() => Library.GetTypes().Where(type => type.Namespace?.StartsWith(Root, StringComparison.Ordinal) == true);

    private static string? RoomOf(Type type)
    {
        var parts = type.Namespace?.Split('.') ?? [];
        return parts.Length > 1 && parts[0] == Root ? parts[1] : null;
    }

    private static bool IsOpenCv(Type type) => type.Assembly.GetName().Name!.StartsWith(OpenCv, StringComparison.Ordinal);

    private static IEnumerable<Type> KnownTypes(Type type)
    {
        const BindingFlags all = BindingFlags.Public | BindingFlags.NonPublic | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly;
        var members = type.GetMembers(all).Where(member => member is not Type).ToArray();
        return HeadOf(type)
            .Concat(members.SelectMany(SignatureOf))
            .Concat(members.OfType<MethodBase>().SelectMany(BodyOf))
            .SelectMany(Parts);
    }

    private static IEnumerable<Type> HeadOf(Type type) => type.GetInterfaces().Append(type.BaseType ?? typeof(object))
        .Concat(type.GetCustomAttributesData().Select(attribute => attribute.AttributeType));

    private static IEnumerable<Type> SignatureOf(MemberInfo member) => member switch
    {
        FieldInfo field => [field.FieldType],
        PropertyInfo property => [property.PropertyType],
        EventInfo raised => [raised.EventHandlerType!],
        MethodInfo method => method.GetParameters().Select(parameter => parameter.ParameterType).Append(method.ReturnType)
            .Concat(method.GetGenericArguments().SelectMany(argument => argument.IsGenericParameter ? argument.GetGenericParameterConstraints() : [argument])),
        ConstructorInfo constructor => constructor.GetParameters().Select(parameter => parameter.ParameterType),
        _ => [],
    };

    private static IEnumerable<Type> BodyOf(MethodBase method)
    {
        if (method.GetMethodBody() is not { } body)
        {
            return [];
        }

        return body.LocalVariables.Select(local => local.LocalType)
            .Concat(body.ExceptionHandlingClauses.Where(clause => clause.Flags == ExceptionHandlingClauseOptions.Clause).Select(clause => clause.CatchType!))
            .Concat(Tokens(body.GetILAsByteArray()!).SelectMany(token => Resolve(method, token)));
    }

    private static IEnumerable<Type> Resolve(MethodBase method, int token)
    {
        var ofType = method.DeclaringType is { IsGenericType: true } declaring ? declaring.GetGenericArguments() : null;
        var ofMethod = method.IsGenericMethod ? method.GetGenericArguments() : null;
        var member = method.Module.ResolveMember(token, ofType, ofMethod)!;
        return member as Type is { } type ? [type] : SignatureOf(member).Append(member.DeclaringType ?? typeof(object));
    }

    // The metadata tokens among the operands of a method's instructions.
    private static IEnumerable<int> Tokens(byte[] code)
    {
        for (var at = 0; at < code.Length;)
        {
            var opcode = code[at] == 0xFE ? Opcodes[(short)(0xFE00 | code[at + 1])] : Opcodes[code[at]];
            at += opcode.Size;
            switch (opcode.OperandType)
            {
                case OperandType.InlineField or OperandType.InlineMethod or OperandType.InlineType or OperandType.InlineTok:
                    yield return BitConverter.ToInt32(code, at);
                    at += 4;
                    break;
                case OperandType.InlineSwitch:
                    at += 4 + 4 * BitConverter.ToInt32(code, at);
                    break;
                case OperandType.InlineNone:
                    break;
                case OperandType.ShortInlineBrTarget or OperandType.ShortInlineI or OperandType.ShortInlineVar:
                    at += 1;
                    break;
                case OperandType.InlineVar:
                    at += 2;
                    break;
                case OperandType.InlineI8 or OperandType.InlineR:
                    at += 8;
                    break;
                default:
                    at += 4;
                    break;
            }
        }
    }

    private static readonly Dictionary<short, OpCode> Opcodes = typeof(OpCodes).GetFields(BindingFlags.Public | BindingFlags.Static)
        .Select(field => (OpCode)field.GetValue(null)!)
        .ToDictionary(opcode => opcode.Value);

    // The type itself, what it is an array, pointer or reference of, and its type arguments.
    private static IEnumerable<Type> Parts(Type type)
    {
        if (type.HasElementType)
        {
            return Parts(type.GetElementType()!);
        }

        if (type.IsGenericParameter)
        {
            return [];
        }

        return type.IsGenericType ? type.GetGenericArguments().SelectMany(Parts).Append(type.GetGenericTypeDefinition()) : [type];
    }

    private static string LibraryFolder([System.Runtime.CompilerServices.CallerFilePath] string here = "") =>
        Path.GetFullPath(Path.Combine(Path.GetDirectoryName(here)!, "..", "..", "..", "kernel-extension", "Pairwright"));

    private static class Uses
    {
        public static object InBody() => new Func<object>(() =>
        {
            using var picture = new OpenCvSharp.Mat();
            return picture.Empty() ? typeof(Geometry.RawCurveTests) : new object();
        })();
    }
}
