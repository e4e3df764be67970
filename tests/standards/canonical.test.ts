import { describe, expect, test } from 'vitest'
import { canonicalBytes, canonicalText, type Json } from '../../shared/domain/canonical'

/*
 * RFC 8785, JSON Canonicalization Scheme. Sections 3.2.2 to 3.2.4 for the example and its bytes, Appendix B for numbers; the other
 * pairs are the test data that the RFC's Appendix F refers to (cyberphone/json-canonicalization, testdata).
 */

describe('RFC 8785', () => {
  test('the example of sections 3.2.2 to 3.2.4, as text and as bytes', () => {
    const input = JSON.parse('{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}') as Json
    expect(canonicalText(input)).toBe('{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}')
    expect(Buffer.from(canonicalBytes(input)).toString('hex')).toBe([
      '7b226c69746572616c73223a5b6e756c6c2c747275652c66616c73655d2c226e756d62657273223a5b3333333333333333332e333333333333332c31652b33302c',
      '342e352c302e3030322c31652d32375d2c22737472696e67223a22e282ac245c75303030665c6e4127425c225c5c5c5c5c222f227d',
    ].join(''))
  })

  test('section 3.2.3: members in the order of UTF-16 code units', () => {
    const input = JSON.parse('{"\\u20ac":"Euro Sign","\\r":"Carriage Return","\\ufb33":"Hebrew Letter Dalet With Dagesh","1":"One","\\ud83d\\ude00":"Emoji: Grinning Face","\\u0080":"Control","\\u00f6":"Latin Small Letter O With Diaeresis"}') as Record<string, Json>
    expect(Object.values(JSON.parse(canonicalText(input)) as object)).toEqual([
      // an object's integer keys come first when it is read back, which is where "1" stands anyway but for "\r"
      'One', 'Carriage Return', 'Control', 'Latin Small Letter O With Diaeresis', 'Euro Sign', 'Emoji: Grinning Face', 'Hebrew Letter Dalet With Dagesh',
    ])
    expect(canonicalText(input).indexOf('\\r')).toBeLessThan(canonicalText(input).indexOf('"1"'))
  })

  test.each([
    ['weird', '{"\\u20ac":"Euro Sign","1":"One","\\u0080":"Control\\u007f","\\ud83d\\ude02":"Smiley","\\u00f6":"Latin Small Letter O With Diaeresis","\\ufb33":"Hebrew Letter Dalet With Dagesh","</script>":"Browser Challenge"}',
      '{"1":"One","</script>":"Browser Challenge","\u0080":"Control\u007f","ö":"Latin Small Letter O With Diaeresis","€":"Euro Sign","😂":"Smiley","\ufb33":"Hebrew Letter Dalet With Dagesh"}'],
    ['structures', '{"1":{"f":{"f":"hi","F":5},"\\n":56.0},"10":{},"":"empty","a":{},"111":[{}],"A":{}}', '{"":"empty","1":{"\\n":56,"f":{"F":5,"f":"hi"}},"10":{},"111":[{}],"A":{},"a":{}}'],
    ['french', '{"peach":"This sorting order","péché":"is wrong according to French","pêche":"but canonicalization MUST","sin":"ingnore locale"}',
      '{"peach":"This sorting order","péché":"is wrong according to French","pêche":"but canonicalization MUST","sin":"ingnore locale"}'],
    ['values', '{"numbers":[1E30,4.50,333333333.33333329,2e-3,0.000000000000000000000000001],"escaping":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
      '{"escaping":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/","literals":[null,true,false],"numbers":[1e+30,4.5,333333333.3333333,0.002,1e-27]}'],
  ])('test data: %s', (_, input, output) => {
    expect(canonicalText(JSON.parse(input) as Json)).toBe(output)
  })

  /** Appendix B: IEEE 754 bits and the text they are written as. */
  test.each([
    ['0000000000000000', '0'], ['8000000000000000', '0'], ['0000000000000001', '5e-324'], ['8000000000000001', '-5e-324'],
    ['7fefffffffffffff', '1.7976931348623157e+308'], ['ffefffffffffffff', '-1.7976931348623157e+308'], ['4340000000000000', '9007199254740992'],
    ['c340000000000000', '-9007199254740992'], ['4430000000000000', '295147905179352830000'], ['44b52d02c7e14af5', '9.999999999999997e+22'],
    ['44b52d02c7e14af6', '1e+23'], ['44b52d02c7e14af7', '1.0000000000000001e+23'], ['444b1ae4d6e2ef4e', '999999999999999700000'],
    ['444b1ae4d6e2ef4f', '999999999999999900000'], ['444b1ae4d6e2ef50', '1e+21'], ['3eb0c6f7a0b5ed8c', '9.999999999999997e-7'],
    ['3eb0c6f7a0b5ed8d', '0.000001'], ['41b3de4355555553', '333333333.3333332'], ['41b3de4355555554', '333333333.33333325'],
    ['41b3de4355555555', '333333333.3333333'], ['41b3de4355555556', '333333333.3333334'], ['41b3de4355555557', '333333333.33333343'],
    ['becbf647612f3696', '-0.0000033333333333333333'], ['43143ff3c1cb0959', '1424953923781206.2'],
  ])('number %s is %s', (bits, text) => {
    expect(canonicalText(Buffer.from(bits, 'hex').readDoubleBE())).toBe(text)
  })

  test.each([['NaN', Number.NaN], ['Infinity', Number.POSITIVE_INFINITY], ['a lone high surrogate', '\ud83d'], ['a lone low surrogate', 'x\ude00'], ['a lone surrogate as a name', { '\ud83d': 1 }]])('%s has no canonical form', (_, value) => {
    expect(() => canonicalText(value)).toThrow(TypeError)
  })

  test('neither have undefined, functions and dates inside', () => {
    expect(() => canonicalText([undefined as unknown as Json])).toThrow('a undefined has no canonical form')
    expect(() => canonicalText({ a: (() => 1) as unknown as Json })).toThrow('a function has no canonical form')
    expect(canonicalText('😂')).toBe('"😂"')
  })
})
