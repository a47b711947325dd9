using System.Collections.Immutable;
using System.Reflection.Emit;
using System.Reflection.Metadata;
using System.Reflection.Metadata.Ecma335;
using System.Reflection.PortableExecutable;

namespace InterfaceFE.Tests.Architecture;

/// <summary>A type that uses another one, anywhere: base type, member, attribute, local variable or instruction of a method body.</summary>
/// <param name="User">Namespace and name of the outermost user.</param>
/// <param name="UserNamespace">Its namespace.</param>
/// <param name="Used">Namespace and name of the outermost type used.</param>
/// <param name="UsedNamespace">Its namespace.</param>
/// <param name="UsedAssembly">Name of its assembly; empty for the assembly that was read.</param>
internal sealed record TypeUse(string User, string UserNamespace, string Used, string UsedNamespace, string UsedAssembly);

/// <summary>Reads from the metadata and the instructions of a built assembly which types use which. Constants and enumeration values that the compiler copied leave no trace.</summary>
internal sealed class AssemblyUses
{
    private static readonly Dictionary<int, OpCode> OpCodesByValue = typeof(OpCodes).GetFields()
        .Where(f => f.FieldType == typeof(OpCode)).Select(f => (OpCode)f.GetValue(null)!).ToDictionary(o => (int)(ushort)o.Value);

    private readonly PEReader _file;
    private readonly MetadataReader _metadata;
    private readonly TypeCollector _collector;
    private readonly HashSet<TypeUse> _uses = [];
    private (string Full, string Namespace) _user;

    private AssemblyUses(PEReader file)
    {
        _file = file;
        _metadata = file.GetMetadataReader();
        _collector = new TypeCollector(Use);
    }

    /// <summary>All uses in an assembly, of other types than the user itself.</summary>
    public static IReadOnlyCollection<TypeUse> Read(string assemblyFile)
    {
        using FileStream stream = File.OpenRead(assemblyFile);
        using PEReader file = new(stream);
        AssemblyUses reader = new(file);
        foreach (TypeDefinitionHandle type in reader._metadata.TypeDefinitions)
            reader.ReadType(type);
        return reader._uses;
    }

    private void ReadType(TypeDefinitionHandle handle)
    {
        TypeDefinition type = _metadata.GetTypeDefinition(handle);
        (_user.Full, _user.Namespace, _) = Name(handle);
        Use(type.BaseType);
        foreach (InterfaceImplementationHandle i in type.GetInterfaceImplementations())
            Use(_metadata.GetInterfaceImplementation(i).Interface);
        Attributes(type.GetCustomAttributes());
        Constraints(type.GetGenericParameters());
        foreach (FieldDefinitionHandle f in type.GetFields())
        {
            FieldDefinition field = _metadata.GetFieldDefinition(f);
            field.DecodeSignature(_collector, null);
            Attributes(field.GetCustomAttributes());
        }
        foreach (PropertyDefinitionHandle p in type.GetProperties())
            Attributes(_metadata.GetPropertyDefinition(p).GetCustomAttributes());
        foreach (MethodDefinitionHandle m in type.GetMethods())
            ReadMethod(_metadata.GetMethodDefinition(m));
    }

    private void ReadMethod(MethodDefinition method)
    {
        method.DecodeSignature(_collector, null);
        Attributes(method.GetCustomAttributes());
        Constraints(method.GetGenericParameters());
        foreach (ParameterHandle p in method.GetParameters())
            Attributes(_metadata.GetParameter(p).GetCustomAttributes());
        if (method.RelativeVirtualAddress == 0)
            return;
        MethodBodyBlock body = _file.GetMethodBody(method.RelativeVirtualAddress);
        if (!body.LocalSignature.IsNil)
            _metadata.GetStandaloneSignature(body.LocalSignature).DecodeLocalSignature(_collector, null);
        foreach (ExceptionRegion region in body.ExceptionRegions)
            Use(region.CatchType);
        ReadInstructions(body.GetILReader());
    }

    private void ReadInstructions(BlobReader code)
    {
        while (code.RemainingBytes > 0)
        {
            int value = code.ReadByte();
            if (value == 0xFE)
                value = 0xFE00 | code.ReadByte();
            switch (OpCodesByValue[value].OperandType)
            {
                case OperandType.InlineMethod or OperandType.InlineField or OperandType.InlineType or OperandType.InlineTok or OperandType.InlineSig:
                    Use(MetadataTokens.EntityHandle(code.ReadInt32()));
                    break;
                case OperandType.InlineSwitch:
                    int targets = code.ReadInt32();
                    code.Offset += 4 * targets;
                    break;
                case OperandType.InlineNone:
                    break;
                case OperandType.InlineI8 or OperandType.InlineR:
                    code.Offset += 8;
                    break;
                case OperandType.ShortInlineBrTarget or OperandType.ShortInlineI or OperandType.ShortInlineVar:
                    code.Offset += 1;
                    break;
                case OperandType.InlineVar:
                    code.Offset += 2;
                    break;
                default:
                    code.Offset += 4;
                    break;
            }
        }
    }

    private void Use(EntityHandle handle)
    {
        if (handle.IsNil)
            return;
        switch (handle.Kind)
        {
            case HandleKind.TypeDefinition or HandleKind.TypeReference:
                (string full, string space, string assembly) = Name(handle);
                if (full != _user.Full)
                    _uses.Add(new TypeUse(_user.Full, _user.Namespace, full, space, assembly));
                break;
            case HandleKind.TypeSpecification:
                _metadata.GetTypeSpecification((TypeSpecificationHandle)handle).DecodeSignature(_collector, null);
                break;
            case HandleKind.MethodDefinition:
                MethodDefinition method = _metadata.GetMethodDefinition((MethodDefinitionHandle)handle);
                Use(method.GetDeclaringType());
                method.DecodeSignature(_collector, null);
                break;
            case HandleKind.FieldDefinition:
                FieldDefinition field = _metadata.GetFieldDefinition((FieldDefinitionHandle)handle);
                Use(field.GetDeclaringType());
                field.DecodeSignature(_collector, null);
                break;
            case HandleKind.MemberReference:
                MemberReference member = _metadata.GetMemberReference((MemberReferenceHandle)handle);
                Use(member.Parent);
                if (member.GetKind() == MemberReferenceKind.Method)
                    member.DecodeMethodSignature(_collector, null);
                else
                    member.DecodeFieldSignature(_collector, null);
                break;
            case HandleKind.MethodSpecification:
                MethodSpecification made = _metadata.GetMethodSpecification((MethodSpecificationHandle)handle);
                Use(made.Method);
                made.DecodeSignature(_collector, null);
                break;
            case HandleKind.StandaloneSignature:
                _metadata.GetStandaloneSignature((StandaloneSignatureHandle)handle).DecodeMethodSignature(_collector, null);
                break;
        }
    }

    private void Attributes(CustomAttributeHandleCollection attributes)
    {
        foreach (CustomAttributeHandle attribute in attributes)
            Use(_metadata.GetCustomAttribute(attribute).Constructor);
    }

    private void Constraints(GenericParameterHandleCollection parameters)
    {
        foreach (GenericParameterHandle parameter in parameters)
            foreach (GenericParameterConstraintHandle constraint in _metadata.GetGenericParameter(parameter).GetConstraints())
                Use(_metadata.GetGenericParameterConstraint(constraint).Type);
    }

    /// <summary>Name and namespace of the outermost type around a type, and its assembly (empty for this one).</summary>
    private (string Full, string Namespace, string Assembly) Name(EntityHandle handle)
    {
        if (handle.Kind == HandleKind.TypeDefinition)
        {
            TypeDefinition type = _metadata.GetTypeDefinition((TypeDefinitionHandle)handle);
            while (type.IsNested)
                type = _metadata.GetTypeDefinition(type.GetDeclaringType());
            string space = _metadata.GetString(type.Namespace);
            return ($"{space}.{_metadata.GetString(type.Name)}", space, "");
        }
        TypeReference reference = _metadata.GetTypeReference((TypeReferenceHandle)handle);
        while (reference.ResolutionScope.Kind == HandleKind.TypeReference)
            reference = _metadata.GetTypeReference((TypeReferenceHandle)reference.ResolutionScope);
        string outer = _metadata.GetString(reference.Namespace);
        string assembly = reference.ResolutionScope.Kind == HandleKind.AssemblyReference
            ? _metadata.GetString(_metadata.GetAssemblyReference((AssemblyReferenceHandle)reference.ResolutionScope).Name)
            : "";
        return ($"{outer}.{_metadata.GetString(reference.Name)}", outer, assembly);
    }

    /// <summary>Walks signatures and tells each type in them; the results themselves are of no interest.</summary>
    private sealed class TypeCollector(Action<EntityHandle> use) : ISignatureTypeProvider<int, object?>
    {
        public int GetTypeFromDefinition(MetadataReader reader, TypeDefinitionHandle handle, byte rawTypeKind) => Tell(handle);

        public int GetTypeFromReference(MetadataReader reader, TypeReferenceHandle handle, byte rawTypeKind) => Tell(handle);

        public int GetTypeFromSpecification(MetadataReader reader, object? genericContext, TypeSpecificationHandle handle, byte rawTypeKind) => Tell(handle);

        public int GetArrayType(int elementType, ArrayShape shape) => 0;

        public int GetByReferenceType(int elementType) => 0;

        public int GetFunctionPointerType(MethodSignature<int> signature) => 0;

        public int GetGenericInstantiation(int genericType, ImmutableArray<int> typeArguments) => 0;

        public int GetGenericMethodParameter(object? genericContext, int index) => 0;

        public int GetGenericTypeParameter(object? genericContext, int index) => 0;

        public int GetModifiedType(int modifier, int unmodifiedType, bool isRequired) => 0;

        public int GetPinnedType(int elementType) => 0;

        public int GetPointerType(int elementType) => 0;

        public int GetPrimitiveType(PrimitiveTypeCode typeCode) => 0;

        public int GetSZArrayType(int elementType) => 0;

        private int Tell(EntityHandle handle)
        {
            use(handle);
            return 0;
        }
    }
}
