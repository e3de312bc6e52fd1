using System.Numerics;
using System.Text.Json;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Document;

/// <summary>The object form of a distribution while it is read.</summary>
internal ref struct DistributionDraft
{
    private MisfitList misfits;
    private string? type;
    private bool typeMisread;
    private Numbers sent;
    private Numbers misread;
    private (PairNames Names, List<(double, double)> Pairs)? list;
    private List<string>? others;

    public DistributionDraft()
    {
    }

    public DistributionJson Read(ref Utf8JsonReader reader)
    {
        Span<double> values = stackalloc double[DistributionForm.Names.Count];
        var seen = new MemberNames();
        while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
            ReadMember(ref reader, seen.Next(ref reader), values);
        if (type is not null)
            CheckMembers(type);
        else if (!typeMisread)
            misfits.Add(Misfit.Missing("", "type"));
        return new DistributionJson(type ?? "", sent, Packed(values), list?.Pairs, misfits.All);
    }

    private void ReadMember(ref Utf8JsonReader reader, string name, scoped Span<double> values)
    {
        var bit = BitOf(name);
        if (name == "type")
        {
            type = DistributionForm.Word(ref reader) ?? misfits.Text(ref reader, name);
            typeMisread = type is null && reader.TokenType != JsonTokenType.Null;
        }
        else if (bit >= 0)
        {
            ReadNumber(ref reader, name, bit, values);
        }
        else if (PairNames.Named(name) is { } names && list is null)
        {
            list = (names, ReadPairs(ref reader, names));
        }
        else
        {
            (others ??= []).Add(name);
            reader.Skip();
        }
    }

    private void ReadNumber(ref Utf8JsonReader reader, string name, int bit, scoped Span<double> values)
    {
        var absent = reader.TokenType == JsonTokenType.Null;
        if (misfits.Number(ref reader, "", name) is { } number)
        {
            values[bit] = number;
            sent |= (Numbers)(1 << bit);
        }
        else if (!absent)
        {
            misread |= (Numbers)(1 << bit);
        }
    }

    private List<(double, double)> ReadPairs(ref Utf8JsonReader reader, PairNames names)
    {
        var pairs = new List<(double, double)>();
        if (reader.TokenType != JsonTokenType.StartArray)
        {
            misfits.Add(Misfit.Kind("", names.List, "a list"));
            reader.Skip();
            return pairs;
        }
        while (reader.Read() && reader.TokenType != JsonTokenType.EndArray)
        {
            if (reader.TokenType == JsonTokenType.StartObject)
            {
                pairs.Add(ReadPair(ref reader, names, pairs.Count));
                continue;
            }
            misfits.Add(new Misfit($"/{names.List}/{pairs.Count}", FaultCodes.MemberKind, $"An entry of '{names.List}' must be an object."));
            reader.Skip();
            pairs.Add(default);
        }
        return pairs;
    }

    private (double, double) ReadPair(ref Utf8JsonReader reader, PairNames names, int index)
    {
        double first = double.NaN, second = double.NaN;
        var path = $"/{names.List}/{index}";
        bool hasFirst = false, hasSecond = false;
        var seen = new MemberNames();
        while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
        {
            var name = seen.Next(ref reader);
            var absent = reader.TokenType == JsonTokenType.Null;
            if (name == names.First)
                (first, hasFirst) = (misfits.Number(ref reader, path, name) ?? double.NaN, !absent);
            else if (name == names.Second)
                (second, hasSecond) = (misfits.Number(ref reader, path, name) ?? double.NaN, !absent);
            else
            {
                misfits.Add(Misfit.Unknown(path, name, $"An entry of '{names.List}'"));
                reader.Skip();
            }
        }
        if (!hasFirst)
            misfits.Add(Misfit.Missing(path, names.First));
        if (!hasSecond)
            misfits.Add(Misfit.Missing(path, names.Second));
        return (first, second);
    }

    private void CheckMembers(string word)
    {
        if (DistributionForm.Find(word, sent | misread) is not { } form)
        {
            misfits.Add(new Misfit("/type", FaultCodes.TypeUnknown, $"'type' must be one of {DistributionForm.Words}."));
            return;
        }
        var owner = $"A {word} distribution";
        foreach (var name in DistributionForm.NamesOf(form.Needs & ~(sent | misread)))
            misfits.Add(Misfit.Missing("", name));
        foreach (var name in DistributionForm.NamesOf((sent | misread) & ~(form.Needs | form.May)))
            misfits.Add(Misfit.Unknown("", name, owner));
        if (list is { } sentList && sentList.Names != form.List)
            misfits.Add(Misfit.Unknown("", sentList.Names.List, owner));
        if (form.List is { } needed && list?.Names != needed)
            misfits.Add(Misfit.Missing("", needed.List));
        foreach (var name in others ?? [])
            misfits.Add(Misfit.Unknown("", name, owner));
    }

    private readonly double[] Packed(ReadOnlySpan<double> values)
    {
        var packed = new double[BitOperations.PopCount((uint)sent)];
        var next = 0;
        for (var bit = 0; bit < values.Length; bit++)
            if (((int)sent & (1 << bit)) != 0)
                packed[next++] = values[bit];
        return packed;
    }

    private static int BitOf(string name)
    {
        for (var bit = 0; bit < DistributionForm.Names.Count; bit++)
            if (ReferenceEquals(DistributionForm.Names[bit], name) || DistributionForm.Names[bit] == name)
                return bit;
        return -1;
    }
}
